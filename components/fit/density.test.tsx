import { contour, densityAt, densityOf, histogram, levelHolding } from './density';

/** A steady stream of normal deviates about the middle of the square. */
function cloud(n: number) {
  let state = 12345;
  const uniform = () => (state = (Math.imul(state, 1664525) + 1013904223) >>> 0) / 2 ** 32;
  const normal = () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform());
  return Array.from({ length: n }, () => ({ x: 0.5 + 0.1 * normal(), y: 0.45 + 0.12 * normal() }));
}

test('the contour of a share holds that share of the points', () => {
  const points = cloud(800);
  const density = densityOf(points);
  for (const share of [0.68, 0.95]) {
    const level = levelHolding(density, points, share);
    const inside = points.filter((p) => densityAt(density, p) >= level).length / points.length;
    expect(inside).toBeCloseTo(share, 2);
  }
});

test('a contour lies where the density has its level, and closes around the middle', () => {
  const points = cloud(400);
  const density = densityOf(points, 60);
  const level = levelHolding(density, points, 0.68);
  const segments = contour(density, level);
  expect(segments.length).toBeGreaterThan(20);
  for (const end of segments.flat()) expect(densityAt(density, end) / level).toBeCloseTo(1, 1);
  // each end is shared by two segments where nothing runs off the grid
  const ends = new Map<string, number>();
  for (const { x, y } of segments.flat()) {
    const key = `${x.toFixed(9)} ${y.toFixed(9)}`;
    ends.set(key, (ends.get(key) ?? 0) + 1);
  }
  expect([...ends.values()].every((n) => n === 2)).toBe(true);
});

test('the mean radius of a contour is that of a normal cloud', () => {
  const points = cloud(3000);
  const density = densityOf(points, 80);
  const ends = contour(density, levelHolding(density, points, 0.68)).flat();
  const mean =
    ends.reduce((sum, p) => sum + Math.hypot((p.x - 0.5) / 0.1, (p.y - 0.45) / 0.12), 0) / ends.length;
  expect(Math.abs(mean - 1.51)).toBeLessThan(0.15);
});

test('a saddle is cut in two, not crossed', () => {
  const saddle = { size: 2, value: Float64Array.from([1, 0, 0, 1]) };
  expect(contour(saddle, 0.4)).toHaveLength(2);
  expect(contour(saddle, 0.6)).toHaveLength(2);
  expect(contour(saddle, 2)).toEqual([]);
});

test('bins hold their values, the upper end included', () =>
  expect(histogram([0, 0.1, 0.5, 1, 1.2, -1], [0, 1], 2)).toEqual([2, 2]));
