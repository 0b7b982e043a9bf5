import fc from 'fast-check';
import reference from '@/tests/reference/plane-statistics.json';
import { medianOf, planeStatistics } from './statistics';

describe.each(reference.planes)('$name', ({ plane, statistics }) => {
  it('agrees with numpy', () => {
    const got = planeStatistics(Float32Array.from(plane, (v) => v ?? NaN));
    for (const [name, value] of Object.entries(statistics)) {
      const mine = got[name as keyof typeof got];
      if (value === null) expect(mine).toBeNull();
      else expect(Math.abs(mine! - value)).toBeLessThanOrEqual(1e-13 * Math.abs(value));
    }
  });
});

it('takes infinities for blanks', () => {
  expect(planeStatistics(Float32Array.of(1, Infinity, -Infinity, NaN, 3))).toMatchObject({
    blank: 3,
    mean: 2,
    max: 3,
  });
});

describe('medianOf', () => {
  const sortedMedian = (values: number[]) => {
    const sorted = Float64Array.from(values).sort();
    const middle = values.length >> 1;
    return values.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
  };

  it('equals the median of the sorted values', () => {
    const values = fc.array(
      fc.oneof(fc.integer({ min: -3, max: 3 }), fc.double({ noNaN: true, min: -9, max: 9 })),
      {
        minLength: 1,
        maxLength: 50,
      },
    );
    fc.assert(
      // + 0: which of two zeros stands in the middle does not matter
      fc.property(values, (v) =>
        expect(medianOf(Float64Array.from(v), v.length) + 0).toBe(sortedMedian(v) + 0),
      ),
    );
  });

  it.each([
    ['rising', (i: number) => i],
    ['falling', (i: number) => -i],
    ['constant', () => 7],
    ['two values', (i: number) => i % 2],
    ['saw', (i: number) => i % 1000],
    ['noise', (i: number) => Math.sin(i * i)],
  ])('of many values: %s', (_name, value) => {
    for (const n of [4001, 60_000]) {
      const values = Array.from({ length: n }, (_, i) => value(i));
      expect(medianOf(Float64Array.from(values), n)).toBe(sortedMedian(values));
    }
  });

  it('has none of nothing', () => expect(medianOf(new Float64Array(0), 0)).toBeNaN());
});
