import fc from 'fast-check';
import { movedEnd, shareOf, trackRange, valueAt } from '@/components/cube/windowScale';
import { brightness, coordinateDigits, windowWords } from '@/components/cube/words';

const range = { low: -3, high: 97 };

test('value to share and back; the faint tenth has a third of the track', () => {
  fc.assert(
    fc.property(fc.double({ min: -3, max: 97, noNaN: true }), (v) => {
      expect(valueAt(range, shareOf(range, v))).toBeCloseTo(v, 9);
    }),
  );
  expect(shareOf(range, 7)).toBeCloseTo(Math.sqrt(0.1), 9);
  expect(shareOf({ low: 4, high: 4 }, 4)).toBe(0);
});

test('the ends never pass each other', () => {
  fc.assert(
    fc.property(
      fc.double({ min: -0.5, max: 1.5, noNaN: true }),
      fc.constantFrom(0 as const, 1 as const),
      (s, end) => {
        const [low, high] = movedEnd(range, [10, 40], end, s);
        expect(low).toBeLessThan(high);
        expect(low).toBeGreaterThanOrEqual(-3);
        expect(high).toBeLessThanOrEqual(97);
        expect(end === 0 ? high : low).toBe(end === 0 ? 40 : 10);
      },
    ),
  );
});

test('the track holds a window that reaches past the data', () => {
  expect(trackRange([-9, 20], -3, 15)).toEqual({ low: -9, high: 20 });
  expect(trackRange([0, 1], null, null)).toEqual({ low: 0, high: 1 });
});

test('numbers in words', () => {
  expect([brightness(18.63), brightness(-0.0421), brightness(1234), brightness(0), brightness(NaN)]).toEqual([
    '18.6',
    '−0.042',
    '1234',
    '0.000',
    'no value',
  ]);
  expect(brightness(1.5e-6)).toBe('1.50e−6');
  expect(windowWords([2.5, 27], 'K')).toBe('2.5–27 K');
  expect(windowWords([-0.0968, 2.83], null)).toBe('−0.097 to 2.8');
  expect(windowWords([-48, -17], 'km/s')).toBe('−48 to −17 km/s');
  expect(windowWords([0, 1350], 'mJy')).toBe('0–1400 mJy');
  expect([coordinateDigits(0.025), coordinateDigits(1e-4), coordinateDigits(2)]).toEqual([3, 5, 1]);
});
