import type { CubeRecipe, ShellRecipe } from '@/shared/synthetic/recipe';

/** What differs between the settings in which the tracing of a rim is measured. */
export interface TraceSetting {
  name: string;
  shell?: Partial<ShellRecipe>;
  cube?: Partial<Pick<CubeRecipe, 'sky' | 'beam'>>;
}

const SHELL: ShellRecipe = {
  name: 'measured',
  l: 121.2,
  b: -4.1,
  theta: 1.7,
  vSys: -46,
  vExp: 15.5,
  arc: { from: 0, to: 360 },
  thickness: 0.05,
  ripple: 0,
  dispersion: 2,
  clumps: 0.7,
  peak: 18,
  hollow: 0.45,
};
const SKY = { projection: 'CAR', centre: { l: 121, b: -4 }, pixel: 0.05 } as const;

export const TRACE_SETTINGS: TraceSetting[] = [
  { name: 'standard: 5 % thick, 2 km/s' },
  { name: 'thin: 3 %, 1 km/s', shell: { thickness: 0.03, dispersion: 1 } },
  { name: 'thick: 10 %', shell: { thickness: 0.1 } },
  { name: 'hot gas: 4 km/s', shell: { dispersion: 4 } },
  { name: 'faint: a third as bright', shell: { peak: 6 } },
  { name: 'no cavity', shell: { hollow: 0 } },
  { name: 'five beams across', cube: { beam: { major: 0.68, minor: 0.68 } } },
];

/** A whole shell in turbulent gas, as each setting changes it. */
export function traceRecipe(
  { shell, cube }: TraceSetting,
  seed: number,
): CubeRecipe & { truth: ShellRecipe } {
  const truth = { ...SHELL, ...shell };
  return {
    object: 'Trace bench',
    seed,
    shape: { nx: 128, ny: 128, channels: 48 },
    sky: SKY,
    velocity: { first: -72, step: 1.03 },
    beam: { major: 0.15, minor: 0.15 },
    gas: {
      layers: [{ brightness: 14, velocity: -44, width: 18, wander: 0 }],
      slope: -3.4,
      contrast: 0.45,
      filaments: 0,
    },
    noise: 0.35,
    shells: [truth],
    store: 'float32',
    ...cube,
    truth,
  };
}
