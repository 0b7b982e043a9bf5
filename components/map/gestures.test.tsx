import { AT_REST, gesture, type GestureCommand, type GestureEvent } from '@/components/map/gestures';

/** Replay events; gives back every command in order and the state at the end. */
function replay(...events: GestureEvent[]) {
  let state = AT_REST;
  const commands: GestureCommand[] = [];
  for (const event of events) {
    const [next, more] = gesture(state, event);
    state = next;
    commands.push(...more.filter((c) => c.do !== 'hover'));
  }
  return { state, commands };
}
const p = (sx: number, sy: number) => ({ sx, sy });
const down = (id: number, sx: number, sy: number, more: Partial<GestureEvent & { type: 'down' }> = {}) =>
  ({
    type: 'down',
    id,
    at: p(sx, sy),
    kind: 'mouse',
    hit: null,
    tool: 'mark',
    extend: false,
    ...more,
  }) as GestureEvent;
const move = (id: number, sx: number, sy: number): GestureEvent => ({ type: 'move', id, at: p(sx, sy) });
const up = (id: number, sx = 0, sy = 0): GestureEvent => ({ type: 'up', id, at: p(sx, sy) });

test('a tap in Mark mode places a mark where it began, even if the hand trembled', () => {
  const { commands, state } = replay(down(1, 50, 60), move(1, 52, 61), up(1, 52, 61));
  expect(commands).toEqual([{ do: 'place', at: p(50, 60) }]);
  expect(state).toEqual(AT_REST);
});

test('a tap outside Mark mode places nothing', () => {
  expect(replay(down(1, 5, 5, { tool: 'move' }), up(1)).commands).toEqual([
    { do: 'select', mark: null, extend: false },
  ]);
});

test('a drag pans by all of its way, in Mark mode too', () => {
  const { commands } = replay(down(1, 50, 60), move(1, 53, 60), move(1, 60, 60), move(1, 61, 58), up(1));
  expect(commands).toEqual([
    { do: 'pan', dsx: 10, dsy: 0 },
    { do: 'pan', dsx: 1, dsy: -2 },
  ]);
});

test('a finger may wander further than a mouse', () => {
  const touch = replay(down(1, 0, 0, { kind: 'touch' }), move(1, 8, 0), up(1)).commands;
  expect(touch).toEqual([{ do: 'place', at: p(0, 0) }]);
  expect(replay(down(1, 0, 0), move(1, 8, 0), up(1)).commands).toEqual([{ do: 'pan', dsx: 8, dsy: 0 }]);
});

test('a tap on a mark selects it; a drag moves it and drops it once', () => {
  expect(replay(down(1, 9, 9, { hit: 'a' }), up(1)).commands).toEqual([
    { do: 'select', mark: 'a', extend: false },
  ]);
  const { commands } = replay(down(1, 9, 9, { hit: 'a' }), move(1, 20, 9), move(1, 21, 12), up(1));
  expect(commands).toEqual([
    { do: 'select', mark: 'a', extend: false },
    { do: 'drag', mark: 'a', dsx: 11, dsy: 0 },
    { do: 'drag', mark: 'a', dsx: 1, dsy: 3 },
    { do: 'drop', mark: 'a' },
    { do: 'aim', at: null },
  ]);
});

test('outside Mark mode a drag on a mark pans', () => {
  const events = [down(1, 9, 9, { hit: 'a', tool: 'move' }), move(1, 30, 9), up(1)];
  expect(replay(...events).commands).toEqual([{ do: 'pan', dsx: 21, dsy: 0 }]);
});

test('two fingers zoom about their middle and carry it along', () => {
  const { commands } = replay(
    down(1, 0, 0, { kind: 'touch' }),
    down(2, 100, 0, { kind: 'touch' }),
    move(2, 200, 0),
  );
  expect(commands).toEqual([
    { do: 'pan', dsx: 50, dsy: 0 },
    { do: 'zoom', factor: 2, at: p(100, 0) },
  ]);
});

test('the finger that stays after a pinch pans and never marks', () => {
  const { commands, state } = replay(down(1, 0, 0), down(2, 100, 0), up(1), move(2, 105, 0), up(2));
  expect(commands).toEqual([{ do: 'pan', dsx: 5, dsy: 0 }]);
  expect(state).toEqual(AT_REST);
});

test('a second finger or a lost pointer puts a half-dragged mark back', () => {
  const drag = [down(1, 9, 9, { hit: 'a' }), move(1, 40, 9)];
  expect(replay(...drag, down(2, 80, 9)).commands.at(-1)).toEqual({ do: 'restore', mark: 'a' });
  expect(replay(...drag, { type: 'cancel', id: 1 }).commands.at(-1)).toEqual({ do: 'restore', mark: 'a' });
});

test('the wheel zooms about the pointer, and back again exactly', () => {
  const wheel = (delta: number): GestureEvent => ({ type: 'wheel', at: p(7, 8), delta, pinch: false });
  const [a, b] = replay(wheel(-100), wheel(100)).commands as { do: 'zoom'; factor: number }[];
  expect(a!.factor).toBeGreaterThan(1);
  expect(a!.factor * b!.factor).toBeCloseTo(1, 12);
});

test('a pointer that was never pressed only hovers; a third finger is ignored', () => {
  expect(gesture(AT_REST, move(5, 1, 2))[1]).toEqual([{ do: 'hover', at: p(1, 2) }]);
  expect(gesture(AT_REST, { type: 'leave' })[1]).toEqual([{ do: 'hover', at: null }]);
  const three = replay(down(1, 0, 0), down(2, 9, 0), down(3, 5, 5), move(3, 50, 50), up(3));
  expect(three.state.held.map((h) => h.id)).toEqual([1, 2]);
  expect(three.commands).toEqual([]);
});

const touch = { kind: 'touch' } as const;
const hold = (id: number): GestureEvent => ({ type: 'hold', id });

test('a finger that rests aims, and places where it is lifted', () => {
  const { commands } = replay(down(1, 50, 60, touch), hold(1), move(1, 58, 66), up(1));
  expect(commands).toEqual([
    { do: 'aim', at: p(50, 60) },
    { do: 'aim', at: p(58, 66) },
    { do: 'place', at: p(58, 66) },
    { do: 'aim', at: null },
  ]);
  // a mouse hides nothing, and a finger that went off is dragging
  expect(replay(down(1, 50, 60), hold(1), up(1)).commands).toEqual([{ do: 'place', at: p(50, 60) }]);
  const panned = replay(down(1, 0, 0, touch), move(1, 30, 0), hold(1), up(1));
  expect(panned.commands).toEqual([{ do: 'pan', dsx: 30, dsy: 0 }]);
});

test('a finger that rests on a mark takes it along, magnified', () => {
  const { commands } = replay(down(1, 9, 9, { ...touch, hit: 'a' }), hold(1), move(1, 12, 9), up(1));
  expect(commands).toEqual([
    { do: 'select', mark: 'a', extend: false },
    { do: 'aim', at: p(9, 9) },
    { do: 'drag', mark: 'a', dsx: 3, dsy: 0 },
    { do: 'aim', at: p(12, 9) },
    { do: 'drop', mark: 'a' },
    { do: 'aim', at: null },
  ]);
});

test.each([
  ['Shift in Mark mode', { extend: true }],
  ['the lasso tool', { tool: 'lasso' }],
] as const)('%s draws a lasso from where the press began', (_, more) => {
  const { commands } = replay(down(1, 0, 0, more), move(1, 20, 0), move(1, 20, 20), up(1));
  expect(commands).toEqual([
    { do: 'lasso', phase: 'begin', at: p(0, 0) },
    { do: 'lasso', phase: 'draw', at: p(20, 0) },
    { do: 'lasso', phase: 'draw', at: p(20, 20) },
    { do: 'lasso', phase: 'end', at: p(20, 20) },
  ]);
});

test('with Shift, or the lasso tool, a tap adds a mark to the selection and never places one', () => {
  expect(replay(down(1, 9, 9, { hit: 'a', extend: true }), up(1)).commands).toEqual([
    { do: 'select', mark: 'a', extend: true },
  ]);
  expect(replay(down(1, 9, 9, { extend: true }), up(1)).commands).toEqual([]);
  expect(replay(down(1, 9, 9, { hit: 'a', tool: 'lasso' }), up(1)).commands).toEqual([
    { do: 'select', mark: 'a', extend: true },
  ]);
});

test('the ring tool draws on marks too; a second finger gives up what was begun', () => {
  const ring = [down(1, 0, 0, { ...touch, tool: 'ring', hit: 'a' }), move(1, 40, 0)];
  expect(replay(...ring, up(1)).commands.map((c) => 'phase' in c && `${c.do} ${c.phase}`)).toEqual([
    'ring begin',
    'ring draw',
    'ring end',
  ]);
  expect(replay(...ring, down(2, 90, 0, touch)).commands.at(-1)).toMatchObject({ do: 'ring', phase: 'drop' });
  const aim = replay(down(1, 0, 0, touch), hold(1), down(2, 90, 0, touch), up(2), up(1));
  expect(aim.commands.map((c) => c.do)).toEqual(['aim', 'aim']);
});
