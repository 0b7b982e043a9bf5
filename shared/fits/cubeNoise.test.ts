import { cubeNoise } from './cubeNoise';

test('channels with signal do not raise the noise, however many they are', () => {
  const quiet = [1, 1.01, 0.99, 1.02, 0.98];
  expect(cubeNoise([...quiet, ...Array.from({ length: 15 }, (_, i) => 2 + i)])).toBeCloseTo(1, 12);
});

test('of channels without signal it is the median, not the quietest', () => {
  const noises = Array.from({ length: 101 }, (_, i) => 1 + (i - 50) / 1000);
  expect(cubeNoise(noises)).toBeCloseTo(1, 12);
});

test('padding and blank channels do not count', () => {
  expect(cubeNoise([0, 0, null, 1, 1.02, 1.04])).toBeCloseTo(1.02, 12);
  expect(cubeNoise([0, null])).toBe(0);
  expect(cubeNoise([null])).toBeNull();
});
