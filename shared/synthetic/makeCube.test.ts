import { modelRadius } from '@/shared/shell/channelCurve';
import { destination } from '@/shared/sky/greatCircle';
import { buildWcs } from '@/shared/sky/wcs';
import { gaussianBeam } from './beam';
import { makeCube } from './makeCube';
import type { CubeRecipe, ShellRecipe } from './recipe';
import { rimVisibility } from './visibleArc';
import { wcsOfRecipe } from './wcsOfRecipe';

const SHELL: ShellRecipe = {
  name: 'Test ring',
  l: 40.2,
  b: -3.1,
  theta: 1.6,
  vSys: 5,
  vExp: 16,
  arc: { from: 30, to: 290 },
  thickness: 0.04,
  ripple: 0,
  dispersion: 1.5,
  clumps: 0.4,
  peak: 20,
  hollow: 0.8,
};
const RECIPE: CubeRecipe = {
  object: 'Test',
  seed: 4,
  shape: { nx: 64, ny: 64, channels: 40 },
  sky: { projection: 'CAR', centre: { l: 40, b: -3 }, pixel: 0.075 },
  velocity: { first: -15, step: 1.03 },
  beam: { major: 0.2, minor: 0.2 },
  gas: {
    layers: [{ brightness: 6, velocity: 5, width: 25, wander: 3 }],
    slope: -3.3,
    contrast: 0.2,
    filaments: 0.2,
  },
  noise: 0.2,
  shells: [SHELL],
  store: 'float32',
};
/** Degrees across: far from flat on the sky. */
const WIDE: CubeRecipe = {
  ...RECIPE,
  sky: { projection: 'SFL', centre: { l: 40, b: 38 }, pixel: 0.45 },
  beam: { major: 1.2, minor: 1.2 },
  shells: [{ ...SHELL, l: 41, b: 37, theta: 10.5 }],
};
const TANGENT: CubeRecipe = {
  ...RECIPE,
  sky: { projection: 'TAN', centre: { l: 359.9, b: 62 }, pixel: 0.0145 },
  velocity: { first: 26, step: -1.03 },
  beam: { major: 0.04, minor: 0.04 },
  shells: [{ ...SHELL, l: 0.1, b: 62.02, theta: 0.3 }],
};

/** Brightness at a place, between the pixels. */
function sampler(recipe: CubeRecipe, cube: Float32Array) {
  const { nx, ny } = recipe.shape;
  const wcs = buildWcs(wcsOfRecipe(recipe));
  return (channel: number, lon: number, lat: number): number => {
    const at = wcs.galacticToPixel(lon, lat)!;
    const [i, j] = [Math.floor(at.x), Math.floor(at.y)];
    if (i < 0 || j < 0 || i >= nx - 1 || j >= ny - 1) return NaN;
    const p = (di: number, dj: number) => cube[channel * nx * ny + (j + dj) * nx + i + di]!;
    const [dx, dy] = [at.x - i, at.y - j];
    return (p(0, 0) * (1 - dx) + p(1, 0) * dx) * (1 - dy) + (p(0, 1) * (1 - dx) + p(1, 1) * dx) * dy;
  };
}

/** The radius of the brightest place of a channel's ring, the mean over some position angles. */
function brightestRadius(recipe: CubeRecipe, cube: Float32Array, channel: number, angles: number[]): number {
  const [shell] = recipe.shells as [ShellRecipe];
  const value = sampler(recipe, cube);
  let best = { radius: 0, light: -Infinity };
  for (let radius = 0.2 * shell.theta; radius < 1.25 * shell.theta; radius += 0.005 * shell.theta) {
    const light = angles.reduce((sum, angle) => {
      const { lon, lat } = destination({ lon: shell.l, lat: shell.b }, angle, radius);
      return sum + value(channel, lon, lat);
    }, 0);
    if (light > best.light) best = { radius, light };
  }
  return best.radius;
}

test.each([
  ['plate carree', RECIPE],
  ['sinusoidal, tens of degrees', WIDE],
  ['tangent plane across longitude 0, falling velocities', TANGENT],
])('rings lie on the great circles of the model: %s', (_, recipe) => {
  const [shell] = recipe.shells as [ShellRecipe];
  const cube = makeCube(recipe);
  const { velocityOf, velocityStep } = buildWcs(wcsOfRecipe(recipe));
  let checked = 0;
  for (let k = 0; k < recipe.shape.channels; k++) {
    const u = (velocityOf(k) - shell.vSys) / shell.vExp;
    if (Math.abs(u) > 0.65) continue; // nearer to the caps the channel's velocities blur the ring
    const model = modelRadius(velocityOf(k), velocityStep, shell)!;
    // each third of the arc by itself: a displaced centre would show
    for (const third of [0, 1, 2]) {
      const angles = Array.from({ length: 15 }, (_, i) => 45 + 75 * third + 5 * i);
      const found = brightestRadius(recipe, cube, k, angles);
      expect(Math.abs(found - model)).toBeLessThan(0.3 * recipe.beam.major);
      checked++;
    }
  }
  expect(checked).toBeGreaterThan(55);
});

test('the rim is bright on its arc, missing in the gap, and the interior is dark', () => {
  const cube = makeCube(RECIPE);
  const value = sampler(RECIPE, cube);
  const channel = 19; // 0.45 km/s off vSys
  const ring = modelRadius(-15 + 1.03 * channel, 1.03, SHELL)!;
  const mean = (share: number, from: number, to: number) => {
    const values: number[] = [];
    for (let angle = from; angle <= to; angle += 3) {
      const { lon, lat } = destination({ lon: SHELL.l, lat: SHELL.b }, angle, share * ring);
      values.push(value(channel, lon, lat));
    }
    return values.reduce((a, b) => a + b, 0) / values.length;
  };
  const outside = mean(1.3, 0, 357);
  expect(mean(1, 50, 270)).toBeGreaterThan(2 * outside);
  expect(mean(1, 310, 370)).toBeLessThan(1.5 * outside);
  expect(mean(0.6, 50, 270)).toBeLessThan(0.75 * outside);
});

test('beyond the caps there is nothing of the shell', () => {
  const short = { ...RECIPE, shells: [{ ...SHELL, vExp: 6 }] };
  const [a, b] = [makeCube(short), makeCube({ ...short, shells: [] })];
  const { velocityOf } = buildWcs(wcsOfRecipe(short));
  const size = 64 * 64;
  for (let k = 0; k < 40; k++) {
    let most = 0;
    for (let i = k * size; i < (k + 1) * size; i++) most = Math.max(most, Math.abs(a[i]! - b[i]!));
    if (Math.abs(velocityOf(k) - 5) > 6 + 5 * 1.5) expect(most).toBeLessThan(0.01);
    if (Math.abs(velocityOf(k) - 5) < 6) expect(most).toBeGreaterThan(2);
  }
});

test('the same recipe gives the same bits; another seed another cube', () => {
  const small = { ...RECIPE, shape: { nx: 40, ny: 33, channels: 12 } };
  const cube = makeCube(small);
  expect(makeCube(structuredClone(small))).toEqual(cube);
  expect(makeCube({ ...small, seed: 5 })).not.toEqual(cube);
});

test('noise has the asked size after the beam, and blanks are where the corner is', () => {
  const bare: CubeRecipe = {
    ...RECIPE,
    shape: { nx: 96, ny: 96, channels: 8 },
    gas: { ...RECIPE.gas, layers: [] },
    shells: [],
    noise: 0.35,
    blankCorner: 10,
  };
  const cube = makeCube(bare);
  const values = cube.filter((v) => !Number.isNaN(v));
  expect(cube.length - values.length).toBe(8 * 55);
  expect(cube[9]).toBeNaN();
  expect(cube[10]).not.toBeNaN();
  // the edge pixels count twice and more in the convolution, so leave some tolerance
  const rms = Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / values.length);
  expect(rms / 0.35).toBeGreaterThan(0.97);
  expect(rms / 0.35).toBeLessThan(1.06);
});

test('the beam keeps a level and the light of a point, and is as wide as it says', () => {
  const beam = gaussianBeam(41, 41, { x: 4, y: 6 });
  const level = new Float32Array(41 * 41).fill(3);
  beam.smooth(level);
  expect(Math.max(...level) - 3).toBeLessThan(1e-5);
  expect(3 - Math.min(...level)).toBeLessThan(1e-5);
  const point = new Float32Array(41 * 41);
  point[20 * 41 + 20] = 1;
  beam.smooth(point);
  const at = (x: number, y: number) => point[(20 + y) * 41 + 20 + x]! / point[20 * 41 + 20]!;
  expect(point.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 5);
  expect(at(2, 0)).toBeCloseTo(0.5, 5);
  expect(at(0, 3)).toBeCloseTo(0.5, 5);
});

test('what cannot be made is refused by name', () => {
  const wrong = (shell: Partial<ShellRecipe>) => () =>
    makeCube({ ...RECIPE, shells: [{ ...SHELL, ...shell }] });
  expect(wrong({ theta: 95 })).toThrow(/theta of Test ring/);
  expect(wrong({ vExp: 0 })).toThrow(/vExp of Test ring/);
  expect(wrong({ arc: { from: 20, to: 10 } })).toThrow(/arc of Test ring/);
  expect(() => makeCube({ ...RECIPE, shape: { nx: 0, ny: 3, channels: 2 } })).toThrow(/shape/);
});

test.each([
  [160, 1],
  [30, 0.53],
  [290, 0.53],
  [340, 0.06],
  [-70 + 720, 0.53],
])('at position angle %f the rim shows %f of itself', (angle, share) => {
  expect(rimVisibility(angle, SHELL)).toBeCloseTo(share, 2);
});
