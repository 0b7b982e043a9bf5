import { quantise } from '@/shared/image/quantise';
import { windowOf } from '@/shared/image/windowPresets';

const plane = Float32Array.from({ length: 1001 }, (_, i) => (i === 500 ? NaN : i));

test('shares leave out as much at each end', () => {
  const q = quantise(plane);
  expect(windowOf(q, 1)).toEqual([0, 1000]);
  const [low, high] = windowOf(q, 0.9)!;
  expect(Math.abs(low - 49)).toBeLessThan(1.1);
  expect(Math.abs(high - 951)).toBeLessThan(1.1);
});

test('one value still makes a window, no value makes none', () => {
  expect(windowOf(quantise(Float32Array.from([4, 4, 4])), 0.99)).toEqual([4, 5]);
  expect(windowOf(quantise(Float32Array.from([NaN])), 0.99)).toBeNull();
});
