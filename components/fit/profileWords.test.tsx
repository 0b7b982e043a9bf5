import { below, crossings } from './profileWords';

const values = Array.from({ length: 41 }, (_, i) => 5 + i * 0.25);
const parabola = { parameter: 'vExp' as const, values, deltaChi2: values.map((v) => ((v - 10) / 2) ** 2) };
const open = {
  parameter: 'vExp' as const,
  values,
  deltaChi2: values.map((v) => (v < 10 ? ((v - 10) / 2) ** 2 : 0.3)),
};

test('a parabola rises by one at one standard error to both sides', () => {
  expect(crossings(parabola, 1)).toEqual([8, 12]);
  expect(below(parabola, 1)).toBe('χ² rises by 1 at 8 km/s and 12 km/s');
});

test('a side on which it never rises is said so', () => {
  expect(crossings(open, 1)[0]).toBeCloseTo(8, 9);
  expect(crossings(open, 1)[1]).toBeNull();
  expect(below(open, 1)).toBe('χ² rises by 1 below 8 km/s, and never above');
});
