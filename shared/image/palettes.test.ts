import { fromOklab, toOklab, type Srgb } from '@/shared/image/oklab';
import { cssGradient, PALETTES, rampOf } from '@/shared/image/palettes';

const srgbOf = (pixel: number): Srgb => [
  (pixel & 255) / 255,
  ((pixel >> 8) & 255) / 255,
  ((pixel >> 16) & 255) / 255,
];
const lightness = (ramp: Uint32Array) => Array.from(ramp, (p) => toOklab(srgbOf(p)).L);

test('OKLab agrees with the values its author gives', () => {
  // https://bottosson.github.io/posts/oklab/, table of XYZ and OKLab pairs, D65 white; and sRGB primaries.
  expect(toOklab([1, 1, 1]).L).toBeCloseTo(1, 6);
  const red = toOklab([1, 0, 0]);
  expect([red.L, red.a, red.b].map((v) => Number(v.toFixed(3)))).toEqual([0.628, 0.225, 0.126]);
  const back = fromOklab(toOklab([0.2, 0.5, 0.8]));
  [0.2, 0.5, 0.8].forEach((c, i) => expect(back[i]).toBeCloseTo(c, 6));
});

test.each(PALETTES.filter((p) => p !== 'Parting'))('%s rises evenly in lightness', (name) => {
  const L = lightness(rampOf(name, 256));
  const [first, last] = [L[0]!, L[255]!];
  expect(last - first).toBeGreaterThan(0.75);
  L.forEach((value, i) => {
    // Eight bits a colour leave steps of up to some thousandths.
    expect(Math.abs(value - (first + ((last - first) * i) / 255))).toBeLessThan(0.004);
    if (i >= 4) expect(value).toBeGreaterThan(L[i - 4]!);
  });
});

test('Parting falls to its middle and rises again, equally on both sides, with two hues', () => {
  const ramp = rampOf('Parting', 257);
  const L = lightness(ramp);
  for (let i = 0; i < 128; i++) {
    expect(Math.abs(L[i]! - L[256 - i]!)).toBeLessThan(0.03);
    if (i >= 4) expect(L[i]!).toBeLessThan(L[i - 4]!);
  }
  const [low, high] = [toOklab(srgbOf(ramp[60]!)), toOklab(srgbOf(ramp[196]!))];
  expect(high.b - low.b).toBeGreaterThan(0.15); // told apart along blue to yellow, which most eyes can see
});

test('every colour is opaque, and a gradient lists them', () => {
  for (const name of PALETTES) for (const p of rampOf(name)) expect(p >>> 24).toBe(255);
  expect(cssGradient('Ink', 2)).toBe('linear-gradient(to right, #06080f, #f6f2e9)');
});
