import fc from 'fast-check';
import { BLANK, dequantise, quantise } from '@/shared/image/quantise';

const value = fc.oneof(
  { weight: 8, arbitrary: fc.float({ noNaN: true, noDefaultInfinity: true }) },
  { weight: 1, arbitrary: fc.constantFrom(NaN, Infinity, -Infinity, 0, -0) },
);

test('no value is off by more than half a step, and blanks stay blanks', () => {
  fc.assert(
    fc.property(fc.array(value, { maxLength: 60 }), (numbers) => {
      const plane = Float32Array.from(numbers);
      const q = quantise(plane);
      plane.forEach((v, i) => {
        const n = q.values[i]!;
        if (!Number.isFinite(v)) return expect(n).toBe(BLANK);
        expect(n).toBeLessThan(BLANK);
        const rounding = 4e-16 * (Math.abs(v) + Math.abs(q.offset) + q.scale * 65534);
        expect(Math.abs(q.offset + q.scale * n - v)).toBeLessThanOrEqual(q.scale / 2 + rounding);
      });
    }),
    { numRuns: 400 },
  );
});

test('the extremes come back exactly and use the whole range', () => {
  const q = quantise(Float32Array.from([-2.5, 7, 0.25, NaN]));
  expect([q.values[0], q.values[1], q.values[3]]).toEqual([0, 65534, 65535]);
  const back = dequantise(q);
  expect([back[0], back[1]]).toEqual([-2.5, 7]);
  expect(back[3]).toBeNaN();
});

test('one value, blanks only, nothing', () => {
  expect(quantise(Float32Array.from([3, 3]))).toEqual({
    values: Uint16Array.from([0, 0]),
    scale: 1,
    offset: 3,
    blank: BLANK,
  });
  expect(quantise(Float32Array.from([NaN]))).toEqual({
    values: Uint16Array.from([BLANK]),
    scale: 1,
    offset: 0,
    blank: BLANK,
  });
  expect(quantise(new Float32Array(0)).values).toHaveLength(0);
});
