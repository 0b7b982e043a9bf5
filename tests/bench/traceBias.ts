import type { Edge, TraceOutcome } from '@/shared/contract/traces';
import { seededRandom, type Random } from '@/shared/random';
import { modelRadius } from '@/shared/shell/channelCurve';
import { fitShell } from '@/shared/shell/fit';
import type { FitResult } from '@/shared/shell/fitResult';
import type { FittedShell } from '@/shared/shell/modelRing';
import { groupNoise, leastNoise, noiseGroups } from '@/shared/shell/trace/channelNoise';
import { tracedInput } from '@/shared/shell/trace/traceOutcome';
import { traceRim } from '@/shared/shell/trace/traceRim';
import { separation } from '@/shared/sky/greatCircle';
import { buildWcs, type Wcs } from '@/shared/sky/wcs';
import { makeCube } from '@/shared/synthetic/makeCube';
import type { ShellRecipe } from '@/shared/synthetic/recipe';
import { wcsOfRecipe } from '@/shared/synthetic/wcsOfRecipe';
import { median, quantile, table } from './table';
import { TRACE_SETTINGS, traceRecipe, type TraceSetting } from './traceCubes';

const CUBES = 12;
const FIRST_SEED = 500;
const EDGES: Edge[] = ['ridge', 'inner'];
/** Rings by their place in the shell: |v - v_sys|/v_exp below each limit. */
const ZONES = [0.35, 0.7, 0.9];

/** One edge of one setting: radius errors in beams by zone, and how the fits of the traced rims are off. */
interface Tally {
  radius: number[][];
  kept: number[];
  noise: number[];
  faint: number[];
  theta: number[];
  vExp: number[];
  vSys: number[];
  inErrors: number[][];
}

/**
 * How far off a traced rim is, on cubes of known truth from the project's own generator: the radius by the ring's place
 * in the shell, and the fit of the rim, for ridge and inner edge. The trace starts from fits that are off as a reading's.
 */
export async function benchTraceBias({ cubes = CUBES }: { cubes?: number } = {}): Promise<void> {
  const rows = [
    ['setting', 'edge', 'kept', ...zoneNames(), 'theta off', 'v_exp off', 'v_sys off', 'rms in error bars'],
  ];
  for (const setting of TRACE_SETTINGS) {
    const tallies = new Map(EDGES.map((edge) => [edge, emptyTally()]));
    for (let i = 0; i < cubes; i++) measure(setting, FIRST_SEED + i, tallies);
    for (const [edge, tally] of tallies) rows.push([setting.name, edge, ...describe(tally)]);
  }
  console.log(
    `${cubes} cubes a setting; radius and theta in beams: median [16th, 84th percentile] or (spread)\n`,
  );
  console.log(table(rows));
}

const zoneNames = () => ZONES.map((to, i) => `|u| ${i === 0 ? '<' : `${ZONES[i - 1]} to`} ${to}`);

const emptyTally = (): Tally => ({
  radius: ZONES.map(() => []),
  kept: [],
  noise: [],
  faint: [],
  theta: [],
  vExp: [],
  vSys: [],
  inErrors: [[], [], []],
});

function measure(setting: TraceSetting, seed: number, tallies: Map<Edge, Tally>): void {
  const recipe = traceRecipe(setting, seed);
  const { shape, beam, truth } = recipe;
  const wcs = buildWcs(wcsOfRecipe(recipe));
  const cube = makeCube(recipe);
  const size = shape.nx * shape.ny;
  const planeOf = (channel: number) => cube.subarray(channel * size, (channel + 1) * size);
  const noise = leastNoise(
    noiseGroups(shape.channels).map((k) => groupNoise(planeOf(k), planeOf(k + 1), planeOf(k + 2))),
  )!;
  const fit = readingsFit(truth, beam.major, seededRandom(seed));
  for (const [edge, tally] of tallies) {
    const outcome = traceRim(
      { shape, wcs, fit, edge, noise, beam: { majorDeg: beam.major, minorDeg: beam.minor } },
      planeOf,
    );
    count(tally, outcome, truth, wcs);
    countFit(tally, fitShell(tracedInput(outcome, wcs.velocityStep)), truth, beam.major);
  }
}

/** The fit that a person's reading might have given: off by a third of a beam, 3 % and 4 %, half a km/s. */
function readingsFit(truth: ShellRecipe, beam: number, random: Random): FittedShell {
  const parameters = {
    l: { value: truth.l + 0.3 * beam * random.normal() },
    b: { value: truth.b + 0.3 * beam * random.normal() },
    theta: { value: truth.theta * (1 + 0.03 * random.normal()) },
    vSys: { value: truth.vSys + 0.5 * random.normal() },
    vExp: { value: truth.vExp * (1 + 0.04 * random.normal()) },
  };
  return { model: 'sphere', parameters };
}

function count(
  tally: Tally,
  { sectors, beamDeg, seen, noise, faint }: TraceOutcome,
  truth: ShellRecipe,
  wcs: Wcs,
): void {
  tally.kept.push(seen);
  tally.noise.push(noise);
  tally.faint.push(Number(faint));
  for (const { velocity, l, b } of sectors) {
    if (l === null || b === null) continue;
    const u = Math.abs((velocity - truth.vSys) / truth.vExp);
    const zone = ZONES.findIndex((limit) => u < limit);
    const ring = modelRadius(velocity, wcs.velocityStep, truth);
    if (zone < 0 || ring === null) continue;
    const radius = separation({ lon: truth.l, lat: truth.b }, { lon: l, lat: b });
    tally.radius[zone]!.push((radius - ring) / beamDeg);
  }
}

function countFit(tally: Tally, { parameters }: FitResult, truth: ShellRecipe, beam: number): void {
  const { theta, vExp, vSys } = parameters as Record<
    string,
    { value: number; lo: number; hi: number | null }
  >;
  tally.theta.push((theta!.value - truth.theta) / beam);
  tally.vExp.push(100 * (vExp!.value / truth.vExp - 1));
  tally.vSys.push(vSys!.value - truth.vSys);
  [
    [theta!, truth.theta],
    [vExp!, truth.vExp],
    [vSys!, truth.vSys],
  ].forEach(([p, true_], i) => {
    const { value, lo, hi } = p as { value: number; lo: number; hi: number | null };
    const half = hi === null ? value - lo : (hi - lo) / 2;
    tally.inErrors[i]!.push((value - (true_ as number)) / half);
  });
}

function describe(t: Tally): string[] {
  const signed = (x: number, digits = 2) => `${x < 0 ? '-' : '+'}${Math.abs(x).toFixed(digits)}`;
  const spread = (values: number[]) => (quantile(values, 0.8413) - quantile(values, 0.1587)) / 2;
  const off = (values: number[], digits = 2) =>
    `${signed(median(values), digits)} (${spread(values).toFixed(digits)})`;
  const rms = (values: number[]) => Math.sqrt(values.reduce((sum, v) => sum + v * v, 0) / values.length);
  return [
    median(t.kept).toFixed(2) + (median(t.faint) > 0 ? ' faint' : ''),
    ...t.radius.map(
      (r) => `${signed(median(r))} [${signed(quantile(r, 0.1587))}, ${signed(quantile(r, 0.8413))}]`,
    ),
    off(t.theta),
    `${off(t.vExp, 1)} %`,
    `${off(t.vSys)} km/s`,
    t.inErrors.map((e) => rms(e).toFixed(1)).join(' '),
  ];
}
