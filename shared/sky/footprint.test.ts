import { buildWcs } from '@/shared/sky/wcs';
import { footprintOf, overlaps } from '@/shared/sky/footprint';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

/** 40 by 40 pixels of 0.1 degrees about a place, tangent projection. */
const image = (lon: number, lat: number, frame: 'galactic' | 'icrs' = 'galactic') => {
  const spec: WcsSpec = {
    version: 1,
    sky: {
      frame,
      equinox: null,
      projection: 'TAN',
      referencePixel: [19.5, 19.5],
      reference: [lon, lat],
      matrix: [-0.1, 0, 0, 0.1],
      lonPole: null,
      latPole: null,
      parameters: [],
      size: [40, 40],
    },
    spectral: {
      type: 'VRAD',
      linearIn: null,
      referenceChannel: 0,
      reference: 0,
      step: 1000,
      channels: 4,
      restFrequencyHz: 1420405751.768,
      restAssumed: false,
      convention: 'radio',
      frame: 'LSRK',
    },
  };
  return footprintOf(buildWcs(spec), 40, 40)!;
};

test.each([
  ['the same field', image(120, 5), image(120, 5), true],
  ['neighbours that share an edge strip', image(120, 0), image(123.5, 0), true],
  ['neighbours apart', image(120, 0), image(124.5, 0), false],
  ['across longitude 0', image(359, 0), image(1.5, 0), true],
  ['both over the pole', image(10, 89), image(190, 89), true],
  ['another frame of the same sky', image(0, 0), image(266.405, -28.936, 'icrs'), true],
  ['opposite sides', image(0, 0), image(180, 0), false],
])('%s', (_name, a, b, expected) => {
  expect(overlaps(a, b)).toBe(expected);
  expect(overlaps(b, a)).toBe(expected);
});

test('the circle holds every place', () => {
  const { radius } = image(80, 60);
  // half a diagonal of 39 pixels of 0.1 degrees on the tangent plane
  expect(radius).toBeCloseTo((Math.atan((1.95 * Math.SQRT2 * Math.PI) / 180) * 180) / Math.PI, 6);
});
