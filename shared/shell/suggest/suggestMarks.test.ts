import { seededRandom } from '@/shared/random';
import { planeNoise, suggestMarks, type SuggestionTask } from '@/shared/shell/suggest/suggestMarks';
import { positionAngle, separation } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';

const PIXEL = 0.05;
const [nx, ny] = [96, 90];
/** A plate carrée map about (120, 0), near enough to the equator to be flat. */
const wcs = {
  galacticToPixel: (l: number, b: number) => ({ x: 48 - (l - 120) / PIXEL, y: 45 + b / PIXEL }),
  velocityOf: (k: number) => k,
} as unknown as Wcs;
const RADIUS = 24;

/** A clumpy ring of 24 pixels on a slope, seen from `gap` to the end of a turn only. */
function plane(noise: number, block = 1, gap = 0): SuggestionTask['plane'] {
  const random = seededRandom(7);
  const [w, h] = [Math.ceil(nx / block), Math.ceil(ny / block)];
  const values = new Float32Array(w * h);
  for (let j = 0; j < h; j++)
    for (let i = 0; i < w; i++) {
      const [x, y] = [(i + 0.5) * block - 0.5 - 48, (j + 0.5) * block - 0.5 - 45];
      const angle = ((Math.atan2(-x, y) * 180) / Math.PI + 360) % 360;
      const seen = angle >= gap ? 1 : 0;
      const off = (Math.hypot(x, y) - RADIUS) / 2;
      values[j * w + i] = 0.005 * x + seen * Math.exp(-0.5 * off * off) + noise * random.normal();
    }
  return { values, nx: w, ny: h, block };
}
const at = (degrees: number) => ({
  lon: 120 + RADIUS * PIXEL * Math.sin((degrees * Math.PI) / 180),
  lat: RADIUS * PIXEL * Math.cos((degrees * Math.PI) / 180),
});
const task = (more: Partial<SuggestionTask> = {}): SuggestionTask => ({
  channel: 4,
  plane: plane(0.03),
  wcs,
  ring: { l: 120.04, b: -0.03, theta: RADIUS * PIXEL * 1.06 }, // three marks by hand do not hit it quite
  marks: [at(10), at(130), at(250)],
  beamDeg: 0.15,
  pixelDeg: PIXEL,
  ...more,
});
const sky = ({ x, y }: { x: number; y: number }) => ({ lon: 120 - (x - 48) * PIXEL, lat: (y - 45) * PIXEL });
const off = (s: { x: number; y: number }) => Math.hypot(s.x - 48, s.y - 45) - RADIUS;

test('offers marks on the crest, away from those there are, with an error that holds', () => {
  const found = suggestMarks(task());
  expect(found.length).toBeGreaterThanOrEqual(6);
  for (const s of found) {
    expect(Math.abs(off(s)) * PIXEL).toBeLessThan(3 * s.sigma);
    expect(Math.abs(off(s))).toBeLessThan(1.5);
    for (const mark of task().marks) expect(separation(sky(s), mark)).toBeGreaterThan(0.35);
  }
  const angles = found.map((s) => positionAngle({ lon: 120, lat: 0 }, sky(s)));
  angles.forEach((a, i) => angles.slice(i + 1).forEach((b) => expect(Math.abs(a - b)).toBeGreaterThan(15)));
});

test('offers nothing where no rim is seen, nor on noise', () => {
  const found = suggestMarks(task({ plane: plane(0.03, 1, 180), marks: [at(200), at(270), at(340)] }));
  expect(found.length).toBeGreaterThan(1);
  for (const s of found) {
    const angle = positionAngle({ lon: 120, lat: 0 }, sky(s));
    expect(angle > 165 || angle < 15).toBe(true);
  }
  const empty = plane(0);
  const random = seededRandom(3);
  empty.values.forEach((_, i) => (empty.values[i] = random.normal()));
  expect(suggestMarks(task({ plane: empty })).length).toBeLessThanOrEqual(4);
});

test('a reduced plane offers places in the pixels of the image', () => {
  const found = suggestMarks(task({ plane: plane(0.02, 2) }));
  expect(found.length).toBeGreaterThanOrEqual(4);
  for (const s of found) expect(Math.abs(off(s))).toBeLessThan(2);
});

test('one mark taken leaves the others as they are', () => {
  const found = suggestMarks(task());
  const [taken, ...rest] = found;
  const again = suggestMarks(task({ marks: [...task().marks, sky(taken!)] }));
  expect(again).toEqual(rest);
});

test('the noise of a plane is no smaller than what was put in', () => {
  const noise = planeNoise(plane(0.05), 3);
  expect(noise).toBeGreaterThan(0.05);
  expect(noise).toBeLessThan(0.5);
  expect(planeNoise({ values: new Float32Array(9).fill(NaN), nx: 3, ny: 3 }, 3)).toBe(0);
});
