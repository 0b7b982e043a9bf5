import type { ScreenPoint } from '@/shared/image/viewport';

/**
 * What fingers, mouse and wheel mean on the map: a pure step from (state, event) to (state, commands).
 *
 * A press that does not move is a tap. One that moves pans, drags the mark it began on, or draws, as the tool says;
 * a finger that rests aims. Two pointers pinch, whatever the tool. What lies under a press is found by the caller and
 * comes with the event.
 */
export type PointerKind = 'mouse' | 'touch' | 'pen';

/** What a press is for. `move` also stands where nothing may be marked. */
export type MapTool = 'move' | 'mark' | 'lasso' | 'ring';

export type GestureEvent =
  | {
      type: 'down';
      id: number;
      at: ScreenPoint;
      kind: PointerKind;
      /** The mark under the pointer. */
      hit: string | null;
      tool: MapTool;
      /** With Shift: a tap adds to the selection, a drag draws a lasso. */
      extend: boolean;
    }
  | { type: 'move'; id: number; at: ScreenPoint }
  | { type: 'up'; id: number; at: ScreenPoint }
  | { type: 'cancel'; id: number }
  /** A pointer has rested since it came down. */
  | { type: 'hold'; id: number }
  | { type: 'leave' }
  | { type: 'wheel'; at: ScreenPoint; delta: number; pinch: boolean };

/** Drawn with a held pointer: begun, drawn on, done, or given up. */
export type Phase = 'begin' | 'draw' | 'end' | 'drop';

export type GestureCommand =
  | { do: 'pan'; dsx: number; dsy: number }
  | { do: 'zoom'; factor: number; at: ScreenPoint }
  | { do: 'place'; at: ScreenPoint }
  | { do: 'select'; mark: string | null; extend: boolean }
  | { do: 'drag'; mark: string; dsx: number; dsy: number }
  | { do: 'drop'; mark: string }
  | { do: 'restore'; mark: string }
  /** What the finger hides is shown beside it. */
  | { do: 'aim'; at: ScreenPoint | null }
  | { do: 'lasso' | 'ring'; phase: Phase; at: ScreenPoint }
  | { do: 'hover'; at: ScreenPoint | null };

interface Held {
  id: number;
  at: ScreenPoint;
}

interface Press {
  what: 'press';
  from: ScreenPoint;
  kind: PointerKind;
  hit: string | null;
  tool: MapTool;
  extend: boolean;
}
type Doing =
  | Press
  | { what: 'pan' | 'pinch' | 'aim' | 'lasso' | 'ring' }
  /** `hidden`: by the finger that drags. */
  | { what: 'drag'; mark: string; hidden: boolean };

export interface GestureState {
  held: readonly Held[];
  doing: Doing | null;
}

export const AT_REST: GestureState = { held: [], doing: null };
/** A finger that rests this long aims. */
export const HOLD_MS = 380;

/** A press may wander this far and still be a tap; fingers wander more. */
const SLACK_PX: Record<PointerKind, number> = { mouse: 4, pen: 6, touch: 10 };
/** Zoom for each pixel of wheel; a trackpad's pinch sends smaller steps. */
const WHEEL_STEP = 0.0016;
const PINCH_STEP = 0.01;

type Result = [GestureState, GestureCommand[]];

export function gesture(state: GestureState, event: GestureEvent): Result {
  switch (event.type) {
    case 'wheel': {
      const step = Math.min(Math.max(event.delta, -240), 240) * (event.pinch ? PINCH_STEP : WHEEL_STEP);
      return [state, [{ do: 'zoom', factor: Math.exp(-step), at: event.at }]];
    }
    case 'leave':
      return [state, state.held.length === 0 ? [{ do: 'hover', at: null }] : []];
    case 'down':
      return down(state, event);
    case 'move':
      return move(state, event.id, event.at);
    case 'up':
      return up(state, event.id);
    case 'cancel':
      return cancel(state, event.id);
    case 'hold':
      return hold(state, event.id);
  }
}

function down(state: GestureState, e: Extract<GestureEvent, { type: 'down' }>): Result {
  if (state.held.length >= 2 || state.held.some((h) => h.id === e.id)) return [state, []];
  const held = [...state.held, { id: e.id, at: e.at }];
  // A second finger turns whatever began into a pinch; what was half done is as if it had not begun.
  if (held.length === 2) return [{ held, doing: { what: 'pinch' } }, givenUp(state, e.at)];
  const { at: from, kind, hit, tool, extend } = e;
  return [{ held, doing: { what: 'press', from, kind, hit, tool, extend } }, [{ do: 'hover', at: from }]];
}

function move(state: GestureState, id: number, at: ScreenPoint): Result {
  const before = state.held.find((h) => h.id === id);
  if (!before) return [state, state.held.length === 0 ? [{ do: 'hover', at }] : []];
  const held = state.held.map((h) => (h.id === id ? { id, at } : h));
  const { doing } = state;
  const dsx = at.sx - before.at.sx;
  const dsy = at.sy - before.at.sy;
  const hover: GestureCommand = { do: 'hover', at };
  switch (doing?.what) {
    case 'pinch':
      return [{ held, doing }, pinch(state.held, held)];
    case 'pan':
      return [{ held, doing }, [{ do: 'pan', dsx, dsy }]];
    case 'drag':
      return [{ held, doing }, [...dragged(doing, dsx, dsy, at), hover]];
    case 'aim':
      return [{ held, doing }, [{ do: 'aim', at }, hover]];
    case 'lasso':
    case 'ring':
      return [{ held, doing }, [{ do: doing.what, phase: 'draw', at }, hover]];
    case 'press': {
      const wandered = Math.hypot(at.sx - doing.from.sx, at.sy - doing.from.sy);
      if (wandered <= SLACK_PX[doing.kind]) return [{ held, doing }, []];
      const [next, commands] = begun(doing, at);
      return [{ held, doing: next }, commands];
    }
    default:
      return [{ held, doing }, []];
  }
}

/** From here on it is a drag, which starts where the press did: nothing is lost to the slack. */
function begun({ from, kind, hit, tool, extend }: Press, at: ScreenPoint): [Doing, GestureCommand[]] {
  const [dsx, dsy] = [at.sx - from.sx, at.sy - from.sy];
  const drawn = (what: 'lasso' | 'ring'): [Doing, GestureCommand[]] => [
    { what },
    [
      { do: what, phase: 'begin', at: from },
      { do: what, phase: 'draw', at },
    ],
  ];
  if (tool === 'ring') return drawn('ring');
  if (extend && tool !== 'move') return drawn('lasso');
  if (hit && tool !== 'move') {
    const drag = { what: 'drag', mark: hit, hidden: kind === 'touch' } as const;
    return [drag, [{ do: 'select', mark: hit, extend: false }, ...dragged(drag, dsx, dsy, at)]];
  }
  if (tool === 'lasso') return drawn('lasso');
  return [{ what: 'pan' }, [{ do: 'pan', dsx, dsy }]];
}

const dragged = (
  { mark, hidden }: Extract<Doing, { what: 'drag' }>,
  dsx: number,
  dsy: number,
  at: ScreenPoint,
): GestureCommand[] => [{ do: 'drag', mark, dsx, dsy }, ...(hidden ? [{ do: 'aim', at } as const] : [])];

function pinch(before: readonly Held[], after: readonly Held[]): GestureCommand[] {
  const [a, b] = [before[0]!.at, before[1]!.at];
  const [c, d] = [after[0]!.at, after[1]!.at];
  const apart = Math.hypot(a.sx - b.sx, a.sy - b.sy);
  const now = Math.hypot(c.sx - d.sx, c.sy - d.sy);
  const middle = { sx: (c.sx + d.sx) / 2, sy: (c.sy + d.sy) / 2 };
  return [
    { do: 'pan', dsx: middle.sx - (a.sx + b.sx) / 2, dsy: middle.sy - (a.sy + b.sy) / 2 },
    { do: 'zoom', factor: now / Math.max(apart, 1), at: middle },
  ];
}

function up(state: GestureState, id: number): Result {
  const last = state.held.find((h) => h.id === id);
  if (!last) return [state, []];
  const held = state.held.filter((h) => h.id !== id);
  const { doing } = state;
  // The finger that stays after a pinch goes on panning; it must not end as a tap.
  if (held.length > 0) return [{ held, doing: { what: 'pan' } }, []];
  return [AT_REST, doing ? ended(doing, last.at) : []];
}

function ended(doing: Doing, at: ScreenPoint): GestureCommand[] {
  switch (doing.what) {
    case 'drag':
      return [
        { do: 'drop', mark: doing.mark },
        { do: 'aim', at: null },
      ];
    case 'aim':
      return [
        { do: 'place', at },
        { do: 'aim', at: null },
      ];
    case 'lasso':
    case 'ring':
      return [{ do: doing.what, phase: 'end', at }];
    case 'press': {
      const { hit, tool, extend, from } = doing;
      if (hit || tool !== 'mark') return [{ do: 'select', mark: hit, extend: extend || tool === 'lasso' }];
      return extend ? [] : [{ do: 'place', at: from }];
    }
    default:
      return [];
  }
}

/** A finger that rests aims: at the mark it is on, or at the place where it will set one. */
function hold(state: GestureState, id: number): Result {
  const { doing, held } = state;
  if (doing?.what !== 'press' || doing.tool !== 'mark' || doing.kind === 'mouse' || held[0]?.id !== id)
    return [state, []];
  const aim: GestureCommand = { do: 'aim', at: held[0].at };
  if (!doing.hit) return [{ held, doing: { what: 'aim' } }, [aim]];
  const drag = { what: 'drag', mark: doing.hit, hidden: true } as const;
  return [{ held, doing: drag }, [{ do: 'select', mark: doing.hit, extend: false }, aim]];
}

function cancel(state: GestureState, id: number): Result {
  const last = state.held.find((h) => h.id === id);
  if (!last) return [state, []];
  const held = state.held.filter((h) => h.id !== id);
  return [{ held, doing: held.length > 0 ? { what: 'pan' } : null }, givenUp(state, last.at)];
}

function givenUp({ doing }: GestureState, at: ScreenPoint): GestureCommand[] {
  if (doing?.what === 'lasso' || doing?.what === 'ring') return [{ do: doing.what, phase: 'drop', at }];
  const unaimed: GestureCommand[] =
    doing?.what === 'aim' || (doing?.what === 'drag' && doing.hidden) ? [{ do: 'aim', at: null }] : [];
  return doing?.what === 'drag' ? [{ do: 'restore', mark: doing.mark }, ...unaimed] : unaimed;
}
