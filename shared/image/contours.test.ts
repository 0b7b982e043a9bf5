import { contoursOf } from '@/shared/image/contours';

const cone = (nx: number, ny: number, cx: number, cy: number) =>
  Float32Array.from({ length: nx * ny }, (_, i) => -Math.hypot((i % nx) - cx, Math.floor(i / nx) - cy));

test('a cone has round, closed contours of the right radius', () => {
  const [inner, outer] = contoursOf(cone(60, 50, 29.3, 24.6), 60, 50, [-8, -15]);
  for (const [contour, radius] of [
    [inner!, 8],
    [outer!, 15],
  ] as const) {
    expect(contour.lines).toHaveLength(1);
    const line = contour.lines[0]!;
    expect(line[0]).toEqual(line[line.length - 1]);
    for (const { x, y } of line) expect(Math.abs(Math.hypot(x - 29.3, y - 24.6) - radius)).toBeLessThan(0.03);
  }
});

test('a contour ends at the edge and at blanks and does not follow them', () => {
  const ramp = Float32Array.from({ length: 100 }, (_, i) => i % 10);
  const whole = contoursOf(ramp, 10, 10, [4.5])[0]!.lines;
  expect(whole).toHaveLength(1);
  expect(whole[0]!.every((p) => p.x === 4.5)).toBe(true);
  expect(whole[0]!).toHaveLength(10);
  ramp[44] = NaN;
  const cut = contoursOf(ramp, 10, 10, [4.5])[0]!.lines;
  expect(cut.map((line) => line.length).sort()).toEqual([4, 5]);
  expect(contoursOf(ramp, 10, 10, [20])[0]!.lines).toEqual([]);
});

test('a saddle is parted by its mean', () => {
  const joined = contoursOf(Float32Array.of(1, 0, 0, 1), 2, 2, [0.4])[0]!.lines;
  const parted = contoursOf(Float32Array.of(1, 0, 0, 1), 2, 2, [0.6])[0]!.lines;
  expect([joined.length, parted.length]).toEqual([2, 2]);
  // above the mean the corners that are high stand alone: each line cuts off one of them
  const cuts = (line: { x: number; y: number }[], x: number, y: number) =>
    line.every((p) => Math.abs(p.x - x) + Math.abs(p.y - y) < 0.5);
  expect(parted.some((line) => cuts(line, 0, 0))).toBe(true);
  expect(joined.some((line) => cuts(line, 0, 0))).toBe(false);
  expect(joined.some((line) => cuts(line, 1, 0))).toBe(true);
});
