import type { ScreenPoint } from '@/shared/image/viewport';

/**
 * What fingers, mouse and wheel mean on the map: a pure step from (state, event) to (state, commands).
 *
 * A press that does not move is a tap; one that moves pans, or drags the mark it began on (in Mark mode); two
 * pointers pinch. Which mark lies under a press is found by the caller and comes with the event.
 */
export type PointerKind = 'mouse' | 'touch' | 'pen';

export type GestureEvent =
  | {
      type: 'down';
      id: number;
      at: ScreenPoint;
      kind: PointerKind;
      /** The mark under the pointer. */
      hit: string | null;
      /** Whether taps place marks and drags move them. */
      marking: boolean;
    }
  | { type: 'move'; id: number; at: ScreenPoint }
  | { type: 'up'; id: number; at: ScreenPoint }
  | { type: 'cancel'; id: number }
  | { type: 'leave' }
  | { type: 'wheel'; at: ScreenPoint; delta: number; pinch: boolean };

export type GestureCommand =
  | { do: 'pan'; dsx: number; dsy: number }
  | { do: 'zoom'; factor: number; at: ScreenPoint }
  | { do: 'place'; at: ScreenPoint }
  | { do: 'select'; mark: string | null }
  | { do: 'drag'; mark: string; dsx: number; dsy: number }
  | { do: 'drop'; mark: string }
  | { do: 'restore'; mark: string }
  | { do: 'hover'; at: ScreenPoint | null };

interface Held {
  id: number;
  at: ScreenPoint;
}

type Doing =
  | { what: 'press'; from: ScreenPoint; slack: number; hit: string | null; marking: boolean }
  | { what: 'pan' }
  | { what: 'drag'; mark: string }
  | { what: 'pinch' };

export interface GestureState {
  held: readonly Held[];
  doing: Doing | null;
}

export const AT_REST: GestureState = { held: [], doing: null };

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
  }
}

function down(state: GestureState, e: Extract<GestureEvent, { type: 'down' }>): Result {
  if (state.held.length >= 2 || state.held.some((h) => h.id === e.id)) return [state, []];
  const held = [...state.held, { id: e.id, at: e.at }];
  if (held.length === 2) {
    // A second finger turns whatever began into a pinch; a mark half dragged goes back.
    const back: GestureCommand[] =
      state.doing?.what === 'drag' ? [{ do: 'restore', mark: state.doing.mark }] : [];
    return [{ held, doing: { what: 'pinch' } }, back];
  }
  const doing: Doing = {
    what: 'press',
    from: e.at,
    slack: SLACK_PX[e.kind],
    hit: e.hit,
    marking: e.marking,
  };
  return [{ held, doing }, [{ do: 'hover', at: e.at }]];
}

function move(state: GestureState, id: number, at: ScreenPoint): Result {
  const before = state.held.find((h) => h.id === id);
  if (!before) return [state, state.held.length === 0 ? [{ do: 'hover', at }] : []];
  const held = state.held.map((h) => (h.id === id ? { id, at } : h));
  const { doing } = state;
  const dsx = at.sx - before.at.sx;
  const dsy = at.sy - before.at.sy;
  if (doing?.what === 'pinch') return [{ held, doing }, pinch(state.held, held)];
  if (doing?.what === 'pan') return [{ held, doing }, [{ do: 'pan', dsx, dsy }]];
  if (doing?.what === 'drag')
    return [
      { held, doing },
      [
        { do: 'drag', mark: doing.mark, dsx, dsy },
        { do: 'hover', at },
      ],
    ];
  if (doing?.what === 'press') {
    const moved = { sx: at.sx - doing.from.sx, sy: at.sy - doing.from.sy };
    if (Math.hypot(moved.sx, moved.sy) <= doing.slack) return [{ held, doing }, []];
    // From here on it is a drag, which starts where the press did: nothing is lost to the slack.
    if (doing.marking && doing.hit)
      return [
        { held, doing: { what: 'drag', mark: doing.hit } },
        [
          { do: 'select', mark: doing.hit },
          { do: 'drag', mark: doing.hit, dsx: moved.sx, dsy: moved.sy },
        ],
      ];
    return [{ held, doing: { what: 'pan' } }, [{ do: 'pan', dsx: moved.sx, dsy: moved.sy }]];
  }
  return [{ held, doing }, []];
}

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
  if (!state.held.some((h) => h.id === id)) return [state, []];
  const held = state.held.filter((h) => h.id !== id);
  const { doing } = state;
  // The finger that stays after a pinch goes on panning; it must not end as a tap.
  if (held.length > 0) return [{ held, doing: { what: 'pan' } }, []];
  if (doing?.what === 'drag') return [AT_REST, [{ do: 'drop', mark: doing.mark }]];
  if (doing?.what === 'press') {
    if (doing.hit) return [AT_REST, [{ do: 'select', mark: doing.hit }]];
    return [AT_REST, [doing.marking ? { do: 'place', at: doing.from } : { do: 'select', mark: null }]];
  }
  return [AT_REST, []];
}

function cancel(state: GestureState, id: number): Result {
  if (!state.held.some((h) => h.id === id)) return [state, []];
  const held = state.held.filter((h) => h.id !== id);
  const back: GestureCommand[] =
    state.doing?.what === 'drag' ? [{ do: 'restore', mark: state.doing.mark }] : [];
  return [{ held, doing: held.length > 0 ? { what: 'pan' } : null }, back];
}
