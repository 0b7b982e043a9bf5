import fc from 'fast-check';
import { scaleBar } from '@/shared/image/scaleBar';
import { sexagesimal, sexagesimalTicks } from '@/shared/image/sexagesimal';

test.each([
  [266.41681662, 'hours', 2, '17ʰ45ᵐ40.04ˢ'],
  [-29.00781056, 'degrees', 1, '−29°00′28.1″'],
  [-0.5, 'degrees', 0, '−0°30′00″'],
  [359.99999999, 'hours', 0, '00ʰ00ᵐ00ˢ'],
  [10.99999999, 'degrees', 0, '11°00′00″'],
  [-0.00000001, 'degrees', 0, '0°00′00″'],
  [15, 'hours', -1, '01ʰ00ᵐ'],
  [45, 'degrees', -2, '45°'],
] as const)('%d as %s with %d digits is %s', (value, unit, digits, text) =>
  expect(sexagesimal(value, unit, digits)).toBe(text),
);

test('ticks lie between the ends at whole steps, and neighbours have different labels', () => {
  fc.assert(
    fc.property(
      fc.double({ min: -80, max: 80, noNaN: true }),
      fc.double({ min: 0.001, max: 60, noNaN: true }),
      fc.constantFrom('hours' as const, 'degrees' as const),
      (low, span, unit) => {
        const { values, label } = sexagesimalTicks(low, low + span, 5, unit);
        expect(values.length).toBeGreaterThanOrEqual(1);
        expect(values.length).toBeLessThanOrEqual(16);
        for (const v of values) expect(v >= low - 1e-9 && v <= low + span + 1e-9).toBe(true);
        expect(new Set(values.map(label)).size).toBe(values.length);
      },
    ),
    { numRuns: 300 },
  );
});

test('the bar is the longest round angle that fits, with its length at a distance', () => {
  expect(scaleBar(0.7, null)).toEqual({ degrees: 0.5, label: '30′' });
  expect(scaleBar(1.2, 1000)!.label).toBe('1° · 17.5 pc');
  expect(scaleBar(1e-5, null)).toBeNull();
});
