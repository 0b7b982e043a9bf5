import fc from 'fast-check';
import { labelOf, niceTicks } from '@/shared/image/ticks';

test('round numbers', () => {
  expect(niceTicks(-8.3, -3.6, 5)).toEqual({ values: [-8, -7, -6, -5, -4], step: 1, decimals: 0 });
  expect(niceTicks(0, 0.31, 3)).toEqual({ values: [0, 0.1, 0.2, 0.3], step: 0.1, decimals: 1 });
  expect(niceTicks(70, -70, 3).values).toEqual([-50, 0, 50]);
  expect(niceTicks(2, 2, 5).values).toEqual([]);
  expect(niceTicks(0, NaN, 5).values).toEqual([]);
});

test('inside the ends, evenly spaced, about as many as wished', () => {
  fc.assert(
    fc.property(
      fc.double({ min: -1e6, max: 1e6, noNaN: true }),
      fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
      fc.integer({ min: 2, max: 12 }),
      (low, span, count) => {
        const { values, step, decimals } = niceTicks(low, low + span, count);
        expect(values.length).toBeGreaterThanOrEqual(Math.floor(count / 2) - 1);
        expect(values.length).toBeLessThanOrEqual(count * 2 + 1);
        const slack = step * 1e-6;
        for (const v of values) {
          expect(v).toBeGreaterThanOrEqual(low - slack);
          expect(v).toBeLessThanOrEqual(low + span + slack);
        }
        const labels = values.map((v) => labelOf(v, decimals));
        expect(new Set(labels).size).toBe(labels.length);
      },
    ),
  );
});

test('labels carry a real minus sign and no negative zero', () => {
  expect([labelOf(-42.25, 1), labelOf(-0.01, 1), labelOf(3, 0)]).toEqual(['−42.3', '0.0', '3']);
});
