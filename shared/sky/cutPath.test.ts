import { cutPath } from './cutPath';
import type { Wcs } from './wcs';

/** A flat patch at the equator, a tenth of a degree a pixel: all that a path asks of coordinates. */
const flat = { galacticToPixel: (l: number, b: number) => ({ x: ((l + 180) % 360) * 10, y: b * 10 }) } as Wcs;

test('a segment has both ends, evenly spaced places, none farther than a pixel', () => {
  const { pixels, step } = cutPath(flat, { l: 10, b: 0, toL: 12.05, toB: 0 }, 0.1, 1000);
  expect(pixels).toHaveLength(22);
  expect(step).toBeCloseTo(2.05 / 21, 12);
  expect(pixels[0]).toEqual({ x: expect.closeTo(1900, 9), y: expect.closeTo(0, 9) });
  expect(pixels.at(-1)!.x).toBeCloseTo(1920.5, 9);
});

test('where the image stretches the sky, places are closer together', () => {
  const stretched = { galacticToPixel: (l: number, b: number) => ({ x: l * 40, y: b * 10 }) } as Wcs;
  const { pixels } = cutPath(stretched, { l: 10, b: 0, toL: 12, toB: 0 }, 0.1, 1000);
  for (let i = 1; i < pixels.length; i++) expect(pixels[i]!.x - pixels[i - 1]!.x).toBeLessThanOrEqual(1.0001);
});

test('a ring begins north, runs through east and does not repeat its first place', () => {
  const { pixels, step } = cutPath(flat, { l: 10, b: 0, radius: 1 }, 0.1, 1000);
  expect(pixels[0]!.y).toBeCloseTo(10, 9);
  const quarter = pixels[Math.round(pixels.length / 4)]!;
  expect(quarter.x).toBeGreaterThan(1905);
  expect(step * pixels.length).toBeCloseTo(360 * Math.sin(Math.PI / 180), 9);
  expect(pixels.at(-1)!.x).toBeLessThan(1900);
});

test.each([
  [{ l: 10, b: 0, toL: 10, toB: 0 }, /begins where it ends/],
  [{ l: 10, b: 0, toL: 190, toB: 0 }, /Opposite/],
  [{ l: 10, b: 0, toL: 170, toB: 0 }, /longer than 1000/],
])('%j has no path', (shape, message) => {
  expect(() => cutPath(flat, shape, 0.1, 1000)).toThrow(message);
});
