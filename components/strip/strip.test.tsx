import fc from 'fast-check';
import { flickedBy, flickLasts, speedOf } from '@/components/strip/flick';
import { held, positionAt, seen, stripLayout, xOf } from '@/components/strip/stripLayout';
import { positionOfVelocity, stepped, stripOrder } from '@/components/strip/stripOrder';
import { stripText } from '@/components/strip/stripText';

describe('order', () => {
  const falling = stripOrder([30, 20, 10, 0]);
  test('velocities rise even where the file descends', () => {
    expect(falling.channels).toEqual([3, 2, 1, 0]);
    expect(falling.velocities).toEqual([0, 10, 20, 30]);
    expect(falling.positions[3]).toBe(0);
    expect(stripOrder([1, 2, 3]).channels).toEqual([0, 1, 2]);
  });
  test('a step up is a step up in velocity, held at the ends', () => {
    expect([stepped(falling, 2, 1), stepped(falling, 0, 1), stepped(falling, 0, -5)]).toEqual([1, 0, 3]);
  });
  test('velocities between and beyond channels', () => {
    expect([10, 15, -5, 40].map((v) => positionOfVelocity(falling, v))).toEqual([1, 1.5, -0.5, 4]);
    expect(positionOfVelocity(stripOrder([4]), 9)).toBe(0);
  });
  test('every channel has one position and back', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -300, max: 300, noNaN: true }), { minLength: 1 }), (v) => {
        const order = stripOrder(v);
        v.forEach((_, k) => expect(order.channels[order.positions[k]!]).toBe(k));
        for (let p = 1; p < v.length; p++)
          expect(order.velocities[p]!).toBeGreaterThanOrEqual(order.velocities[p - 1]!);
      }),
    );
  });
});

describe('layout', () => {
  test('few channels are a rule, many a film', () => {
    expect(stripLayout(768, 48, 'fine')).toMatchObject({ film: false, pitch: 16, cell: 2 });
    expect(stripLayout(390, 48, 'coarse')).toMatchObject({ film: true, pitch: 10, cell: 3 });
    expect(stripLayout(390, 20, 'coarse').film).toBe(false);
  });
  test('x and back, and the film keeps the current channel in the middle', () => {
    for (const l of [stripLayout(700, 50, 'fine'), stripLayout(390, 300, 'coarse')])
      for (const p of [0, 7.25, 49]) expect(positionAt(l, xOf(l, p, 12), 12)).toBeCloseTo(p, 9);
    const film = stripLayout(400, 300, 'coarse');
    expect(xOf(film, 12, 12)).toBe(200);
    expect(seen(film, 12)).toEqual([0, 32]);
    expect([held(film, -3), held(film, 400)]).toEqual([0, 299]);
  });
});

describe('flick', () => {
  const at = (x: number, time: number) => ({ x, time });
  test('speed is that of the last stretch', () => {
    expect(speedOf([at(0, 0), at(50, 500), at(90, 540), at(120, 570)], 572)).toBeCloseTo(1, 6);
  });
  test('a finger that rested before letting go does not flick', () => {
    expect(speedOf([at(0, 0), at(100, 50)], 400)).toBe(0);
    expect(speedOf([at(0, 0), at(2, 60)], 60)).toBe(0);
    expect(speedOf([], 0)).toBe(0);
  });
  test('it slows down and comes to rest in a finite time', () => {
    const end = flickLasts(2);
    expect(flickedBy(2, end + 1000) - flickedBy(2, end)).toBeLessThan(0.51);
    expect(flickedBy(2, 100)).toBeGreaterThan(flickedBy(2, 200) - flickedBy(2, 100));
    expect(flickLasts(0)).toBe(0);
  });
});

test('says neighbouring narrow channels apart', () => {
  const order = stripOrder([1.5, 1.566, 1.632]);
  const said = [0, 1, 2].map((channel) => stripText({ order, channel, marks: new Map([[1, 1]]) }));
  expect(said).toEqual([
    '1.50 km/s, channel 1 of 3',
    '1.57 km/s, channel 2 of 3, 1 mark',
    '1.63 km/s, channel 3 of 3',
  ]);
  expect(stripText({ order, channel: 2, marks: new Map(), next: [2] })).toBe(
    '1.63 km/s, channel 3 of 3, marks here would help most',
  );
});
