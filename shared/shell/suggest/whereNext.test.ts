import fc from 'fast-check';
import { liveFit } from '@/shared/shell/fit';
import { modelRadius } from '@/shared/shell/channelCurve';
import { bestApart, whereNext, type NextTask } from '@/shared/shell/suggest/whereNext';
import { destination } from '@/shared/sky/greatCircle';

const shell = { l: 118, b: -3, theta: 1.6, vSys: -40, vExp: 14 };
const velocities = Array.from({ length: 41 }, (_, k) => -60 + k);
const ring = (channel: number, from = 0, arc = 360, n = 8) =>
  Array.from({ length: n }, (_, i) => {
    const velocity = velocities[channel]!;
    const at = destination(
      { lon: shell.l, lat: shell.b },
      from + (i * arc) / n,
      modelRadius(velocity, 1, shell)! + 0.02 * Math.sin(7.3 * i + channel),
    );
    return { channel, l: at.lon, b: at.lat, velocity, sigma: 0.05 };
  });
const task = (marks: NextTask['marks']): NextTask => ({
  marks,
  shell,
  channelWidth: 1,
  velocities,
  sigma: 0.05,
  shared: 0.03,
});

test('rings about v_sys want one near a cap; one cap marked wants the other', () => {
  const middle = [16, 20, 24].flatMap((k) => ring(k));
  const next = whereNext(task(middle));
  const u = (velocity: number) => Math.abs(velocity - shell.vSys) / shell.vExp;
  expect(u(next[0]!.velocity)).toBeGreaterThan(0.7);
  expect(next[0]!.expansion).toBeGreaterThan(0.5);
  const low = whereNext(task([8, 12, 16, 20].flatMap((k) => ring(k))));
  expect(low[0]!.velocity).toBeGreaterThan(shell.vSys);
});

test('only unmarked channels within the span are named, by falling gain', () => {
  const next = whereNext(task([16, 20, 24].flatMap((k) => ring(k))));
  expect(next.map((n) => n.channel).sort((a, b) => a - b)).toEqual(
    velocities.flatMap((v, k) => (Math.abs(v + 40) < 14 && ![16, 20, 24].includes(k) ? [k] : [])),
  );
  next.slice(1).forEach((n, i) => expect(n.gain).toBeLessThanOrEqual(next[i]!.gain));
  for (const n of next) expect(n.gain).toBeGreaterThan(0);
  const best = bestApart(next, 3);
  expect(best[0]).toBe(next[0]);
  expect(best.length).toBeLessThanOrEqual(3);
});

test('what it foretells is what happens: the ring named first lessens the error of v_exp more than the last one', () => {
  const marks = [16, 20, 24].flatMap((k) => ring(k));
  const next = whereNext(task(marks)).filter((n) => Math.abs(n.velocity + 40) < 13);
  const error = (channel: number) =>
    liveFit({ marks: [...marks, ...ring(channel)], channelWidth: 1 }).extra.leastSquaresSe.vExp!;
  expect(error(next[0]!.channel)).toBeLessThan(0.6 * error(next.at(-1)!.channel));
});

test('a ring never makes anything worse, on whatever part of the rim', () => {
  fc.assert(
    fc.property(
      fc.uniqueArray(fc.integer({ min: 8, max: 32 }), { minLength: 3, maxLength: 8 }),
      fc.double({ min: 0, max: 360, noNaN: true }),
      fc.double({ min: 60, max: 360, noNaN: true }),
      (channels, from, arc) => {
        for (const n of whereNext(task(channels.flatMap((k) => ring(k, from, arc))))) {
          expect(n.expansion).toBeGreaterThan(-1e-6);
          expect(n.centre).toBeGreaterThan(-1e-6);
          expect(n.expansion).toBeLessThan(1);
        }
      },
    ),
  );
});

test('marks that leave a parameter free name nothing', () => {
  expect(whereNext(task(ring(20)))).toEqual([]);
  expect(whereNext(task([]))).toEqual([]);
});
