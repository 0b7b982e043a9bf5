/**
 * The palettes as another colour library sees them: their curves of lightness, in two spaces that are not the one they
 * were made in, and as an eye without working M cones (deuteranopia) sees them.
 */
import { converter, differenceCiede2000, filterDeficiencyDeuter, type Color } from 'culori';
import { PALETTES, rampOf } from '@/shared/image/palettes';

const STEPS = 65;
const colours = (name: (typeof PALETTES)[number]): Color[] =>
  Array.from(rampOf(name, STEPS), (p) => ({
    mode: 'rgb',
    r: (p & 255) / 255,
    g: ((p >> 8) & 255) / 255,
    b: ((p >> 16) & 255) / 255,
  }));
const lab = converter('lab65');
const oklab = converter('oklab');
const deuteranope = filterDeficiencyDeuter(1);
const unlike = differenceCiede2000();
const sequential = PALETTES.filter((p) => p !== 'Parting');

test.each(sequential)('%s: lightness L* rises at every step, without a plateau or a jump', (name) => {
  for (const seen of [colours(name), colours(name).map((c) => deuteranope(c))]) {
    const L = seen.map((c) => lab(c).l);
    const mean = (L[STEPS - 1]! - L[0]!) / (STEPS - 1);
    expect(L[STEPS - 1]! - L[0]!).toBeGreaterThan(75);
    for (let i = 2; i < STEPS; i++) {
      const step = (L[i]! - L[i - 2]!) / 2;
      expect(step).toBeGreaterThan(0.3 * mean);
      expect(step).toBeLessThan(2 * mean);
    }
  }
});

test.each(sequential)('%s: the curve of lightness in OKLab is straight to a hundredth', (name) => {
  const L = colours(name).map((c) => oklab(c).l);
  L.forEach((value, i) => {
    const even = L[0]! + ((L[STEPS - 1]! - L[0]!) * i) / (STEPS - 1);
    expect(Math.abs(value - even)).toBeLessThan(0.01);
  });
});

test.each(PALETTES)(
  '%s: colours an eighth of the palette apart differ plainly, for a deuteranope too',
  (name) => {
    for (const seen of [colours(name), colours(name).map((c) => deuteranope(c))])
      for (let i = 0; i + 8 < STEPS; i++) expect(unlike(seen[i]!, seen[i + 8]!)).toBeGreaterThan(3.5);
  },
);

test('Parting: below and above its middle are told apart by hue, for a deuteranope too', () => {
  for (const seen of [colours('Parting'), colours('Parting').map((c) => deuteranope(c))])
    for (let i = 4; i <= STEPS >> 1; i++) {
      const [below, above] = [seen[(STEPS >> 1) - i]!, seen[(STEPS >> 1) + i]!];
      expect(unlike(below, above)).toBeGreaterThan(8);
      expect(Math.abs(lab(below).l - lab(above).l)).toBeLessThan(9); // equal size looks equally light
    }
});

test('a rainbow would fail these tests', () => {
  const hsl = converter('rgb');
  const L = Array.from(
    { length: STEPS },
    (_, i) => lab(hsl({ mode: 'hsl', h: (300 * i) / STEPS, s: 1, l: 0.5 }))!.l,
  );
  expect(L.some((value, i) => i > 0 && value < L[i - 1]!)).toBe(true);
});
