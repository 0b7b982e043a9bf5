import { modelRadius } from '@/shared/shell/channelCurve';
import { fitShell } from '@/shared/shell/fit';
import { positionAngle, separation } from '@/shared/sky/greatCircle';
import { buildWcs } from '@/shared/sky/wcs';
import { marksOf, type MarkingStyle } from './marksOf';
import type { CubeRecipe, ShellRecipe } from './recipe';
import { wcsOfRecipe } from './wcsOfRecipe';

const SHELL: ShellRecipe = {
  name: 'Test ring',
  l: 221.6,
  b: -23.4,
  theta: 7.5,
  vSys: -36.5,
  vExp: 19,
  arc: { from: 60, to: 330 },
  thickness: 0.04,
  ripple: 0,
  dispersion: 2,
  clumps: 0.4,
  peak: 20,
  hollow: 0.8,
};
const FIELD: Pick<CubeRecipe, 'shape' | 'sky' | 'velocity' | 'beam'> = {
  shape: { nx: 128, ny: 112, channels: 48 },
  sky: { projection: 'SFL', centre: { l: 219, b: -21 }, pixel: 0.26 },
  velocity: { first: -68, step: 1.35 },
  beam: { major: 0.78, minor: 0.7 },
};
const wcs = buildWcs(wcsOfRecipe(FIELD));

const onSky = (style: MarkingStyle, shell = SHELL) =>
  marksOf(FIELD, shell, style).map(({ channel, x, y, sigma }) => ({
    ...wcs.pixelToGalactic(x, y)!,
    velocity: wcs.velocityOf(channel),
    sigma,
  }));

test('marks lie on the visible arc, on the channels that are asked for, in the image', () => {
  const marks = marksOf(FIELD, SHELL, { seed: 1, channels: 6, perChannel: 11, span: [-0.7, 0.7] });
  expect(new Set(marks.map((m) => m.channel)).size).toBe(6);
  expect(marks.length).toBeGreaterThan(60);
  for (const { channel, x, y } of marks) {
    const { l, b } = wcs.pixelToGalactic(x, y)!;
    const angle = positionAngle({ lon: SHELL.l, lat: SHELL.b }, { lon: l, lat: b });
    expect(angle).toBeGreaterThan(59);
    expect(angle).toBeLessThan(331);
    expect(Math.abs(wcs.velocityOf(channel) - SHELL.vSys)).toBeLessThanOrEqual(0.7 * SHELL.vExp);
    expect(x >= 0 && x <= 127 && y >= 0 && y <= 111).toBe(true);
  }
});

test('they scatter by the error across the rim that they state, and by a bias for each ring', () => {
  const off: number[] = [];
  for (let seed = 0; seed < 40; seed++)
    for (const { l, b, velocity, sigma } of onSky({ seed })) {
      const model = modelRadius(velocity, wcs.velocityStep, SHELL)!;
      off.push((separation({ lon: SHELL.l, lat: SHELL.b }, { lon: l, lat: b }) - model) / sigma!);
    }
  const rms = Math.sqrt(off.reduce((sum, z) => sum + z * z, 0) / off.length);
  expect(rms).toBeGreaterThan(1.05); // sqrt(1 + 0.5^2) = 1.118
  expect(rms).toBeLessThan(1.19);
});

test('the same seed gives the same marks', () => {
  expect(marksOf(FIELD, SHELL, { seed: 3 })).toEqual(marksOf(FIELD, SHELL, { seed: 3 }));
  expect(marksOf(FIELD, SHELL, { seed: 3 })).not.toEqual(marksOf(FIELD, SHELL, { seed: 4 }));
});

test('a shell of few channels, or one outside the image, gives few marks or none', () => {
  expect(new Set(marksOf(FIELD, { ...SHELL, vExp: 2 }, { seed: 1 }).map((m) => m.channel)).size).toBeLessThan(
    4,
  );
  expect(marksOf(FIELD, { ...SHELL, l: 100 }, { seed: 1 })).toEqual([]);
});

test('the fit of such marks finds the shell again, off by as much as its errors say', () => {
  const names = ['l', 'b', 'theta', 'vSys', 'vExp'] as const;
  const scores: Record<string, number[]> = { l: [], b: [], theta: [], vSys: [], vExp: [] };
  for (let seed = 100; seed < 150; seed++) {
    const { parameters } = fitShell({ marks: onSky({ seed }), channelWidth: wcs.velocityStep });
    for (const name of names) {
      const { value, se } = parameters[name]!;
      scores[name]!.push((value - SHELL[name]) / se!);
      expect(Math.abs(value - SHELL[name])).toBeLessThan(5 * se!);
    }
  }
  for (const name of names) {
    const z = scores[name]!;
    const mean = z.reduce((a, b) => a + b, 0) / z.length;
    const rms = Math.sqrt(z.reduce((sum, x) => sum + x * x, 0) / z.length);
    expect(Math.abs(mean)).toBeLessThan(0.5); // 50 draws: 0.14 by chance
    expect(rms).toBeGreaterThan(0.6);
    expect(rms).toBeLessThan(1.5);
  }
});
