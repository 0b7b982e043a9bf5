import { inPolygon } from '@/shared/image/polygon';

const at = (x: number, y: number) => ({ x, y });

test('tells inside from outside of a line with a bay in it', () => {
  const line = [at(0, 0), at(10, 0), at(10, 10), at(5, 4), at(0, 10)];
  for (const inside of [at(1, 1), at(9, 8), at(5, 3)]) expect(inPolygon(line, inside)).toBe(true);
  for (const outside of [at(5, 8), at(-1, 5), at(11, 5), at(5, -0.1)])
    expect(inPolygon(line, outside)).toBe(false);
});
test('a line that encloses nothing holds nothing', () => {
  expect(inPolygon([], at(0, 0))).toBe(false);
  expect(inPolygon([at(0, 0), at(5, 5)], at(2, 2))).toBe(false);
});
