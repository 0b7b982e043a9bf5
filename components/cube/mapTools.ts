import type { MapTool } from '@/components/map/gestures';

interface ToolWords {
  label: string;
  key: string;
  /** What to do with it, shown while it is in hand; null where it needs no word. */
  hint: string | null;
}

export const MAP_TOOLS: Record<MapTool, ToolWords> = {
  move: { label: 'Move map', key: 'h', hint: null },
  mark: { label: 'Mark', key: 'm', hint: null },
  lasso: { label: 'Lasso', key: 'l', hint: 'Draw around marks to select them.' },
  ring: { label: 'Ring', key: 'r', hint: 'Press at the centre, drag to the rim.' },
};
export const TOOL_ORDER: readonly MapTool[] = ['move', 'mark', 'lasso', 'ring'];
