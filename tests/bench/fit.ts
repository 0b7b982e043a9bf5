import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { modelRadius } from '@/shared/shell/channelCurve';
import { bootstrapDraws, fitShell, liveFit, solveFit } from '@/shared/shell/fit';
import { frameAt } from '@/shared/shell/frame';
import { solve, workspace } from '@/shared/shell/gaussNewton';
import type { Solved } from '@/shared/shell/solveShell';
import { startValues } from '@/shared/shell/start';
import type { FitInput, SkyMark } from '@/shared/shell/fitInput';
import { seededRandom } from '@/shared/random';
import { destination } from '@/shared/sky/greatCircle';

const SHELL = { theta: 2, vSys: -40, vExp: 15 };
const CENTRE = { lon: 120, lat: -5 };
const SIGMA = 0.06;
const DRAWS = 500;

export interface FitTiming {
  /** Channels x marks in each. */
  name: string;
  marks: number;
  /** All of the fit of record but draws and extras. */
  recordMs: number;
  /** All of the live fit: start values, robust pass, fit, error bars, warnings, rings. */
  liveMs: number;
  /** Start values and one least-squares fit, as scipy's is. */
  repeatMs: number;
  /** 500 draws, the fit itself not counted. */
  bootstrapMs: number;
  /** The same in scipy, and the draws at once in numpy, one thread, in this run; null where python3-scipy is missing. */
  scipy: { fitMs: number; bootstrapMs: number; batchedMs: number } | null;
}

/** Time the sphere fit and its bootstrap beside scipy's, medians in one run, and print a line for each size. */
export async function benchFit(): Promise<FitTiming[]> {
  const sizes = [
    { name: '6x8', input: simulated(6, 8) },
    { name: '12x16', input: simulated(12, 16) },
  ];
  const python = scipyTimings(sizes);
  return sizes.map(({ name, input }) => {
    const fit = liveFit(input, { setAside: false });
    const recordMs = median(40, () => fitShell(input));
    const liveMs = median(100, () => liveFit(input));
    const solved = solveFit(input, { setAside: false });
    const bootstrapMs = median(11, () => bootstrapDraws(solved, {}, 0, DRAWS));
    const repeatMs = median(200, repeatedFit(solved));
    const theirs = python?.find((p) => p.name === name) ?? null;
    if (theirs && Math.abs(theirs.vExp / fit.parameters.vExp!.value - 1) > 1e-4)
      throw new Error(`${name}: scipy finds v_exp ${theirs.vExp}, we ${fit.parameters.vExp!.value}`);
    const timing: FitTiming = {
      name,
      marks: input.marks.length,
      recordMs,
      liveMs,
      repeatMs,
      bootstrapMs,
      scipy: theirs && {
        fitMs: theirs.fitMs,
        bootstrapMs: theirs.bootstrapMs,
        batchedMs: theirs.batchedMs,
      },
    };
    console.log(describe(timing));
    return timing;
  });
}

/** A fit as scipy makes it, from linear start values, in arrays that are used again. */
function repeatedFit({ problem }: Solved): () => unknown {
  const { marks } = problem;
  const ws = workspace(marks, 5);
  return () => {
    const { centre, p } = startValues(marks);
    return solve(
      problem,
      { frame: frameAt(marks, centre), p: Float64Array.from(p) },
      { tolerance: 1e-6 },
      ws,
    );
  };
}

function describe(t: FitTiming): string {
  const ours =
    `fit ${t.name}: record ${ms(t.recordMs)}, live ${ms(t.liveMs)}, repeated ${ms(t.repeatMs)}, ` +
    `${DRAWS} draws ${ms(t.bootstrapMs)}`;
  if (!t.scipy) return `${ours}; python3-scipy is not installed, nothing to compare with`;
  const share = (mine: number, theirs: number, limit: number) =>
    `ours is ${(mine / theirs).toFixed(3)} of it${mine > limit * theirs ? `, MORE THAN ${limit}` : ''}`;
  return (
    `${ours}; scipy: fit ${ms(t.scipy.fitMs)} (${share(t.repeatMs, t.scipy.fitMs, 0.1)}), ` +
    `${DRAWS} draws ${ms(t.scipy.bootstrapMs)} (${share(t.bootstrapMs, t.scipy.bootstrapMs, 0.1)}); ` +
    `the draws at once in numpy ${ms(t.scipy.batchedMs)} (${share(t.bootstrapMs, t.scipy.batchedMs, 1)})`
  );
}

const ms = (value: number) => `${value.toFixed(value < 10 ? 2 : 0)} ms`;

function simulated(channels: number, perChannel: number): FitInput {
  const random = seededRandom(channels);
  const marks: SkyMark[] = [];
  for (let k = 0; k < channels; k++) {
    const u = -0.85 + (1.7 * k) / (channels - 1);
    const velocity = SHELL.vSys + Math.round(u * SHELL.vExp);
    for (let i = 0; i < perChannel; i++) {
      const radius = modelRadius(velocity, 1, SHELL)! + SIGMA * random.normal();
      const { lon, lat } = destination(CENTRE, (360 * (i + random.uniform())) / perChannel, radius);
      marks.push({ l: lon, b: lat, velocity, sigma: SIGMA });
    }
  }
  return { marks, channelWidth: 1 };
}

function median(repeats: number, run: () => unknown): number {
  run();
  const times = Array.from({ length: repeats }, () => {
    const from = performance.now();
    run();
    return performance.now() - from;
  }).sort((a, b) => a - b);
  return times[repeats >> 1]!;
}

interface ScipyTiming {
  name: string;
  fitMs: number;
  bootstrapMs: number;
  batchedMs: number;
  vExp: number;
}

function scipyTimings(sizes: { name: string; input: FitInput }[]): ScipyTiming[] | null {
  const input = {
    sizes: sizes.map(({ name, input: { marks, channelWidth } }) => ({
      name,
      l: marks.map((m) => m.l),
      b: marks.map((m) => m.b),
      velocity: marks.map((m) => m.velocity),
      sigma: marks.map((m) => m.sigma),
      width: channelWidth,
    })),
  };
  const found = spawnSync('/usr/bin/python3', ['-c', 'import scipy'], { stdio: 'ignore' });
  if (found.status !== 0) return null;
  const run = spawnSync('/usr/bin/python3', [join(__dirname, 'fit_scipy.py')], {
    input: JSON.stringify(input),
    encoding: 'utf8',
    env: { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' },
  });
  if (run.status !== 0) throw new Error(`The scipy comparison failed:\n${run.stderr}`);
  return JSON.parse(run.stdout) as ScipyTiming[];
}
