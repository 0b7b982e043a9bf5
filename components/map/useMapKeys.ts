import type { KeyboardEvent, RefObject } from 'react';
import type { ChannelMapProps } from '@/components/map/ChannelMap';
import { HIT_PX, markAt } from '@/components/map/scene';
import { clamped, toScreen, within, type ImagePoint } from '@/shared/image/viewport';

/** Screen pixels an arrow key moves the crosshair by; with Shift five times as far. */
const CROSSHAIR_STEP = 6;
const BORDER = 24;
const ARROWS: Record<string, readonly [number, number]> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};

/**
 * The map by keyboard. Arrows nudge the selected marks, or move the crosshair where none is selected; Enter places a
 * mark there, or takes up the one that lies there; Escape lets go of it. A circle being drawn takes its keys first.
 */
export function useMapKeys(element: RefObject<HTMLElement | null>, props: ChannelMapProps) {
  const { store, nx, ny, tool, scene } = props;
  const crosshairAt = (at: ImagePoint) => {
    const v = store.viewport.get();
    if (!v) return;
    const inside = within({ nx, ny }, at);
    store.crosshair.set(inside);
    store.hover.set(inside);
    // Take the map along when the crosshair reaches its border.
    const { sx, sy } = toScreen(v, inside);
    const over = (s: number, size: number) => Math.min(s - BORDER, 0) + Math.max(s - size + BORDER, 0);
    const [dx, dy] = [over(sx, v.width), over(sy, v.height)];
    if (dx || dy) store.viewport.set(clamped({ ...v, x: v.x + dx / v.scale, y: v.y - dy / v.scale }));
  };
  const held = () => tool !== 'move' && scene.marks.some((mark) => mark.selected && mark.away === 0);
  const press = (scale: number) => {
    const at = store.crosshair.get();
    if (!at || tool === 'move') return false;
    const there = markAt(scene.marks, at, scale, HIT_PX.mouse / 2);
    if (held()) props.onSelect(null, false);
    else if (there) props.onSelect(there, false);
    else props.onPlace(at, 'keys');
    return true;
  };
  const release = () => {
    if (held()) props.onSelect(null, false);
    else if (store.crosshair.get()) store.crosshair.set(null);
    else return false;
    return true;
  };
  const take = (e: KeyboardEvent): boolean => {
    const v = store.viewport.get();
    if (!v || e.ctrlKey || e.metaKey || e.altKey) return false;
    if (props.onRingKey?.(e.key, e.shiftKey)) return true;
    const arrow = ARROWS[e.key];
    if (arrow && held()) {
      props.onNudge?.(arrow[0], arrow[1], e.shiftKey);
      return true;
    }
    if (arrow) {
      const step = ((e.shiftKey ? 5 : 1) * CROSSHAIR_STEP) / v.scale;
      const from = store.crosshair.get() ?? { x: v.x, y: v.y };
      crosshairAt({ x: from.x + arrow[0] * step, y: from.y + arrow[1] * step });
      return true;
    }
    if (e.key === 'Enter' && !e.shiftKey) return press(v.scale);
    return e.key === 'Escape' && release();
  };
  return {
    onKeyDown: (e: KeyboardEvent) => {
      if (!take(e)) return;
      e.preventDefault();
      e.stopPropagation();
    },
    onFocus: () => {
      const v = store.viewport.get();
      if (v && element.current?.matches(':focus-visible')) crosshairAt({ x: v.x, y: v.y });
    },
    onBlur: () => store.crosshair.set(null),
  };
}
