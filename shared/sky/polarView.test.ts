import fc from 'fast-check';
import { resampled, samplingOf } from '@/shared/image/resample';
import { destination, separation } from '@/shared/sky/greatCircle';
import { polarView, stereographicView } from '@/shared/sky/polarView';
import { buildWcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

const spec: WcsSpec = {
  version: 1,
  sky: {
    frame: 'icrs',
    equinox: null,
    projection: 'TAN',
    referencePixel: [100, 100],
    reference: [83, -5],
    matrix: [-0.05, 0, 0, 0.05],
    lonPole: null,
    latPole: null,
    parameters: [],
    size: [201, 201],
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
};
const cube = buildWcs(spec);
const middle = cube.pixelToGalactic(100, 100)!;
const centre = { lon: middle.l, lat: middle.b };
const polar = polarView({ centre, reach: 4, nx: 360, ny: 200 }, cube);

test('there and back, in both frames', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 1, max: 358, noNaN: true }),
      fc.double({ min: 0, max: 190, noNaN: true }),
      (x, y) => {
        const g = polar.pixelToGalactic(x, y)!;
        const back = polar.galacticToPixel(g.l, g.b)!;
        expect(Math.hypot(back.x - x, back.y - y)).toBeLessThan(1e-7);
        const sky = polar.pixelToSky(x, y)!;
        const again = polar.skyToPixel(sky.lon, sky.lat)!;
        expect(Math.hypot(again.x - x, again.y - y)).toBeLessThan(1e-5);
      },
    ),
  );
});

test('a ring about the centre is a straight line: its picture is bright in one row', () => {
  const radius = 2.5;
  const bright = new Float32Array(201 * 201);
  for (let y = 0; y < 201; y++)
    for (let x = 0; x < 201; x++) {
      const g = cube.pixelToGalactic(x, y)!;
      const off = (separation(centre, { lon: g.l, lat: g.b }) - radius) / 0.15;
      bright[y * 201 + x] = Math.exp(-0.5 * off * off);
    }
  const sampling = samplingOf(360, 200, (x, y) => {
    const g = polar.pixelToGalactic(x, y);
    return g && cube.galacticToPixel(g.l, g.b);
  });
  const picture = resampled(bright, 201, 201, 1, sampling);
  for (let x = 0; x < 360; x += 15) {
    let best = 0;
    for (let y = 1; y < 200; y++) if (picture[y * 360 + x]! > picture[best * 360 + x]!) best = y;
    const distance = ((199.5 - best) / 200) * 4;
    expect(Math.abs(distance - radius)).toBeLessThan(0.05);
  }
  expect(picture[0]).not.toBeNaN(); // 4 degrees are inside this image
  const far = samplingOf(2, 1, () => ({ x: 500, y: 3 }));
  expect(Array.from(resampled(bright, 201, 201, 1, far))).toEqual([NaN, NaN]);
});

test('a reduced plane is read at the places of the whole one', () => {
  const reduced = Float32Array.from({ length: 100 }, (_, i) => 2 * (i % 10) + 0.5); // mean x of blocks of 2
  const at = samplingOf(5, 1, (x) => ({ x: 3 * x + 1, y: 9 }));
  expect(Array.from(resampled(reduced, 10, 10, 2, at))).toEqual([1, 4, 7, 10, 13]);
});

test('circles on the sky stay circles in the stereographic view, wherever their centre lies', () => {
  const view = stereographicView(centre, 60, 400, spec);
  expect(view.galacticToPixel(centre.lon, centre.lat)!.x).toBeCloseTo(199.5, 9);
  const off = destination(centre, 40, 30);
  const points = Array.from({ length: 12 }, (_, i) => {
    const { lon, lat } = destination(off, 30 * i, 18);
    return view.galacticToPixel(lon, lat)!;
  });
  // the circle through three of them goes through all
  const [a, b, c] = [points[0]!, points[4]!, points[8]!];
  const d = 2 * (a.x * (b.y - c.y) + b.x * (c.y - a.y) + c.x * (a.y - b.y));
  const s = (p: { x: number; y: number }) => p.x ** 2 + p.y ** 2;
  const x = (s(a) * (b.y - c.y) + s(b) * (c.y - a.y) + s(c) * (a.y - b.y)) / d;
  const y = (s(a) * (c.x - b.x) + s(b) * (a.x - c.x) + s(c) * (b.x - a.x)) / d;
  const r = Math.hypot(a.x - x, a.y - y);
  for (const p of points) expect(Math.abs(Math.hypot(p.x - x, p.y - y) - r)).toBeLessThan(1e-6);
  const edge = view.pixelToGalactic(199.5, 399.5)!;
  expect(separation(centre, { lon: edge.l, lat: edge.b })).toBeCloseTo(60, 6);
});
