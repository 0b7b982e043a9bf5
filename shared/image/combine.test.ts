import { differenceOf, meanOf } from '@/shared/image/combine';
import { quantise } from '@/shared/image/quantise';

const plane = (...values: number[]) => quantise(Float32Array.from(values));

test('the mean counts only the numbers there are', () => {
  const mean = meanOf([plane(0, 2, NaN, NaN), plane(4, 4, 6, NaN)]);
  expect(Array.from(mean, (v) => Math.round(v * 1000) / 1000)).toEqual([2, 3, 6, NaN]);
});

test('a difference is blank where either is', () => {
  expect(Array.from(differenceOf(Float32Array.of(3, NaN, 1), Float32Array.of(1, 1, NaN)))).toEqual([
    2,
    NaN,
    NaN,
  ]);
});

test('planes of different sizes are refused, and so is nothing', () => {
  expect(() => meanOf([])).toThrow('nothing to average');
  expect(() => meanOf([plane(1), plane(1, 2)])).toThrow('cannot be averaged');
  expect(() => differenceOf(new Float32Array(1), new Float32Array(2))).toThrow('no difference');
});
