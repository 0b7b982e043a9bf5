import type { Shell } from '@/shared/contract/shells';
import { kinematicAge } from '@/shared/physics/age';
import { ageLines, chartDomain, logTicks, pointsOf, type ChartPoint } from './chartScale';

const point = (radius: number, vExp: number, error = 0): ChartPoint => ({
  shell: {} as Shell,
  radius,
  radiusError: error,
  vExp,
  vExpError: [error, error],
});

test('the axes hold every point with its error, and an error larger than its value does not reach zero', () => {
  const { x, y } = chartDomain([point(50, 10, 5), point(400, 30, 20), point(5, 8, 50)]);
  for (const [low, high, least, most] of [
    [...x, 5 / 2, 420],
    [...y, 4, 58],
  ] as const) {
    expect(low).toBeGreaterThan(0);
    expect(low).toBeLessThanOrEqual(least);
    expect(high).toBeGreaterThanOrEqual(most);
  }
  const single = chartDomain([point(100, 10)]);
  expect(single.x[1] / single.x[0]).toBeCloseTo(3);
  expect(chartDomain([])).toEqual({ x: [10, 1000], y: [3, 50] });
});

test('every point of a line has its age by the formula of the product', () => {
  const domain = { x: [20, 800] as [number, number], y: [4, 40] as [number, number] };
  const lines = ageLines(domain, 0.6);
  expect(lines.map((l) => l.age)).toEqual(
    [0.3, 1, 3, 10, 30, 100].filter((a) => lines.some((l) => l.age === a)),
  );
  expect(lines.length).toBeGreaterThanOrEqual(2);
  expect(ageLines({ x: [15, 45], y: [9, 27] }, 0.6).length).toBeGreaterThanOrEqual(2);
  for (const { age, points } of lines)
    for (const { x, y } of points) {
      expect(kinematicAge({ value: x, se: 0 }, { value: y, se: 0 }, { factor: 0.6 })!.value).toBeCloseTo(
        age,
        9,
      );
      expect(x).toBeGreaterThanOrEqual(domain.x[0] * 0.999);
      expect(y).toBeLessThanOrEqual(domain.y[1] * 1.001);
    }
});

test('ticks are round, inside, and never fewer than three on a factor of three', () => {
  expect(logTicks([30, 600])).toEqual([50, 100, 200, 500]);
  expect(logTicks([8, 25])).toEqual([10, 15, 20]);
});

test('a shell without a distance or an adopted fit is no point', () => {
  const p = { value: 10, se: 1, lo: 9, hi: null, unit: '' };
  const shell = (adopted: unknown) => ({ adopted }) as Shell;
  expect(pointsOf([shell(null), shell({ radius: null, vExp: p })])).toEqual([]);
  expect(pointsOf([shell({ radius: p, vExp: p })])[0]).toMatchObject({ radius: 10, vExpError: [1, 1] });
});
