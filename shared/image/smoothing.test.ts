import fc from 'fast-check';
import { kernelTo } from '@/shared/image/beamKernel';
import { buildWcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';
import { between, FWHM, roundKernel, smoothed } from '@/shared/image/smoothing';

/** A tangent plane with pixels of so many degrees, north up and longitude to the left. */
const tangent = (pixel: number) =>
  buildWcs({
    version: 1,
    sky: {
      frame: 'galactic',
      equinox: null,
      projection: 'TAN',
      referencePixel: [50, 50],
      reference: [120, 0],
      matrix: [-pixel, 0, 0, pixel],
      lonPole: null,
      latPole: null,
      parameters: [],
      size: [101, 101],
    },
    spectral: {
      type: 'VRAD',
      linearIn: null,
      referenceChannel: 0,
      reference: 0,
      step: 1000,
      channels: 10,
      restFrequencyHz: 1420405751.768,
      restAssumed: false,
      convention: 'radio',
      frame: 'LSRK',
    },
  } satisfies WcsSpec);

const point = (nx: number, ny: number, x: number, y: number) => {
  const plane = new Float32Array(nx * ny);
  plane[y * nx + x] = 1;
  return plane;
};

/** Sum and second moments of a picture about its own middle. */
function moments(plane: Float32Array, nx: number) {
  let [sum, sx, sy, xx, xy, yy] = [0, 0, 0, 0, 0, 0];
  plane.forEach((v, i) => {
    const [x, y] = [i % nx, Math.floor(i / nx)];
    sum += v;
    sx += v * x;
    sy += v * y;
    xx += v * x * x;
    xy += v * x * y;
    yy += v * y * y;
  });
  const [mx, my] = [sx / sum, sy / sum];
  return { sum, xx: xx / sum - mx * mx, xy: xy / sum - mx * my, yy: yy / sum - my * my };
}

test('a point becomes a Gaussian of the moments asked for, and keeps its sum', () => {
  for (const kernel of [
    { xx: 4, xy: 0, yy: 9 },
    { xx: 9, xy: 5, yy: 6 },
    { xx: 9, xy: -5, yy: 6 },
  ]) {
    const m = moments(smoothed(point(81, 81, 40, 40), 81, 81, kernel), 81);
    expect(m.sum).toBeCloseTo(1, 2);
    expect(m.xx / kernel.xx).toBeCloseTo(1, 1);
    expect(m.yy / kernel.yy).toBeCloseTo(1, 1);
    expect(Math.abs(m.xy - kernel.xy)).toBeLessThan(0.2);
  }
});

test('a wide kernel done on block averages agrees with the formula', () => {
  const n = 301;
  const sigma = 20;
  const out = smoothed(point(n, n, 150, 150), n, n, roundKernel(sigma * FWHM));
  const peak = 1 / (2 * Math.PI * sigma ** 2);
  for (const d of [0, 10, 20, 35]) {
    const formula = peak * Math.exp(-0.5 * (d / sigma) ** 2);
    expect(Math.abs(out[150 * n + 150 + d]! - formula)).toBeLessThan(0.05 * peak);
  }
});

test('a level plane stays level at edges and beside blanks; a blank stays blank', () => {
  fc.assert(
    fc.property(
      fc.double({ min: -50, max: 50, noNaN: true }),
      fc.array(fc.integer({ min: 0, max: 24 * 20 - 1 }), { maxLength: 60 }),
      fc.double({ min: 0, max: 12, noNaN: true }),
      (level, blanks, fwhm) => {
        const plane = new Float32Array(24 * 20).fill(level);
        for (const i of blanks) plane[i] = NaN;
        const out = smoothed(plane, 24, 20, roundKernel(fwhm));
        plane.forEach((v, i) => {
          if (Number.isNaN(v)) expect(out[i]).toBeNaN();
          else
            expect(Math.abs(out[i]! - Math.fround(level))).toBeLessThan(1e-4 * Math.max(1, Math.abs(level)));
        });
      },
    ),
    { numRuns: 60 },
  );
});

test('what is no Gaussian, and a plane of another length, are refused', () => {
  expect(() => smoothed(new Float32Array(4), 2, 2, { xx: 1, xy: 2, yy: 1 })).toThrow('no Gaussian');
  expect(() => smoothed(new Float32Array(5), 2, 2, roundKernel(2))).toThrow('5 numbers');
});

test('between pixels brightness is bilinear, and a blank leaves its weight to its neighbours', () => {
  const plane = Float32Array.of(0, 1, 2, 3);
  expect(between(plane, 2, 2, 0.5, 0.5)).toBeCloseTo(1.5);
  expect(between(plane, 2, 2, -0.4, 0)).toBe(0);
  expect(between(Float32Array.of(NaN, 1, 1, 1), 2, 2, 0.5, 0.5)).toBe(1);
  expect(between(Float32Array.of(NaN, 1, 1, 1), 2, 2, 0, 0)).toBeNaN();
});

test('a beam is brought to a round one: what is added lies across the long axis', () => {
  const wcs = tangent(0.01);
  // long axis north: more is needed along east, which is x here
  const kernel = kernelTo(0.1, { major: 0.08, minor: 0.06, angle: 0 }, wcs, { x: 50, y: 50 })!;
  expect(kernel.yy * FWHM ** 2).toBeCloseTo(10 ** 2 - 8 ** 2, 1);
  expect(kernel.xx * FWHM ** 2).toBeCloseTo(10 ** 2 - 6 ** 2, 1);
  expect(Math.abs(kernel.xy)).toBeLessThan(0.01);
  expect(kernelTo(0.07, { major: 0.08, minor: 0.06, angle: 0 }, wcs, { x: 50, y: 50 })).toBeNull();
  // turned by 45 degrees towards east (smaller x): the long axis of the beam runs from lower right to upper left
  const turned = kernelTo(0.1, { major: 0.08, minor: 0.06, angle: 45 }, wcs, { x: 50, y: 50 })!;
  expect(turned.xy).toBeGreaterThan(0.5);
});
