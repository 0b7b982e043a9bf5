import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { makePicture, type PictureJob } from '@/hooks/planes/makePicture';
import { dequantise, quantise } from '@/shared/image/quantise';
import { roundKernel } from '@/shared/image/smoothing';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

const N = 41;
const plane = (channel: number, value: (x: number, y: number) => number): ChannelPlane => ({
  channel,
  width: N,
  height: N,
  block: 1,
  ...quantise(Float32Array.from({ length: N * N }, (_, i) => value(i % N, Math.floor(i / N)))),
});
const wcs: WcsSpec = {
  version: 1,
  sky: {
    frame: 'galactic',
    equinox: null,
    projection: 'TAN',
    referencePixel: [20, 20],
    reference: [50, 10],
    matrix: [-0.1, 0, 0, 0.1],
    lonPole: null,
    latPole: null,
    parameters: [],
    size: [N, N],
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
const job = (more: Partial<PictureJob>): PictureJob => ({
  channel: 3,
  planes: [],
  minus: [],
  smooth: null,
  less: null,
  view: null,
  stretch: null,
  wcs,
  ...more,
});

test('averages, then subtracts', () => {
  const made = makePicture(
    job({ planes: [plane(2, (x) => x), plane(3, (x) => x + 4)], minus: [plane(9, () => 1)] }),
  );
  const values = dequantise(made);
  expect(made.channel).toBe(3);
  expect(values[7]).toBeCloseTo(8, 2);
});

test('what is level is nothing once a wide smoothing is taken off; a point stays', () => {
  const made = makePicture(
    job({ planes: [plane(3, (x, y) => (x === 20 && y === 20 ? 60 : 10))], less: roundKernel(12) }),
  );
  const values = dequantise(made);
  expect(Math.abs(values[0]!)).toBeLessThan(0.1);
  expect(values[20 * N + 20]).toBeGreaterThan(45);
});

test('rings of different size lie on each other in a stack', () => {
  const ring = (radius: number) =>
    plane(3, (x, y) => Math.exp(-((Math.hypot(x - 20, y - 20) - radius) ** 2) / 2));
  const view = { kind: 'polar' as const, centre: { lon: 50, lat: 10 }, reach: 1.8, nx: 36, ny: 36 };
  const made = makePicture(job({ planes: [ring(12), ring(6)], view, stretch: [1, 0.5] }));
  const values = dequantise(made);
  for (let x = 0; x < 36; x += 5) {
    let best = 0;
    for (let y = 1; y < 36; y++) if (values[y * 36 + x]! > values[best * 36 + x]!) best = y;
    expect(Math.abs(((35.5 - best) / 36) * 1.8 - 1.2)).toBeLessThan(0.06);
  }
});

test('nothing makes no picture', () =>
  expect(() => makePicture(job({}))).toThrow('nothing to make a picture of'));
