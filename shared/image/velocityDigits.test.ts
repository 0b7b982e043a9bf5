import fc from 'fast-check';
import { velocityDigits, velocityLabel } from '@/shared/image/velocityDigits';

test('one digit for wide channels, more for narrow ones, never more than four', () => {
  expect([10.3, 1.03, 0.1, 0.1 - 1e-12, 0.066, 0.01, 0.0042, 1e-6].map(velocityDigits)).toEqual([
    1, 1, 1, 1, 2, 2, 3, 4,
  ]);
  expect([0, NaN, Infinity].map(velocityDigits)).toEqual([1, 1, 1]);
  expect(velocityDigits(-0.066)).toBe(2);
});

test('neighbouring channels read differently', () => {
  fc.assert(
    fc.property(
      fc.double({ min: -500, max: 500, noNaN: true }),
      fc.double({ min: 2e-4, max: 20, noNaN: true }),
      (velocity, width) => velocityLabel(velocity, width) !== velocityLabel(velocity + width * 1.0001, width),
    ),
  );
});

test('labels carry a real minus sign', () => {
  expect([velocityLabel(-42.251, 0.066), velocityLabel(-42.251, 1.03)]).toEqual(['−42.25', '−42.3']);
});
