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
  ({ type: 'down', id, at: p(sx, sy), kind: 'mouse', hit: null, marking: true, ...more }) as GestureEvent;
const move = (id: number, sx: number, sy: number): GestureEvent => ({ type: 'move', id, at: p(sx, sy) });
const up = (id: number, sx = 0, sy = 0): GestureEvent => ({ type: 'up', id, at: p(sx, sy) });

test('a tap in Mark mode places a mark where it began, even if the hand trembled', () => {
  const { commands, state } = replay(down(1, 50, 60), move(1, 52, 61), up(1, 52, 61));
  expect(commands).toEqual([{ do: 'place', at: p(50, 60) }]);
  expect(state).toEqual(AT_REST);
});

test('a tap outside Mark mode places nothing', () => {
  expect(replay(down(1, 5, 5, { marking: false }), up(1)).commands).toEqual([{ do: 'select', mark: null }]);
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
  expect(replay(down(1, 9, 9, { hit: 'a' }), up(1)).commands).toEqual([{ do: 'select', mark: 'a' }]);
  const { commands } = replay(down(1, 9, 9, { hit: 'a' }), move(1, 20, 9), move(1, 21, 12), up(1));
  expect(commands).toEqual([
    { do: 'select', mark: 'a' },
    { do: 'drag', mark: 'a', dsx: 11, dsy: 0 },
    { do: 'drag', mark: 'a', dsx: 1, dsy: 3 },
    { do: 'drop', mark: 'a' },
  ]);
});

test('outside Mark mode a drag on a mark pans', () => {
  const events = [down(1, 9, 9, { hit: 'a', marking: false }), move(1, 30, 9), up(1)];
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
