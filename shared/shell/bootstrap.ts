import { blockProducts } from '@/shared/shell/channelDirections';
import { channelDof, FLOOR, unsharedNoise, type ErrorModel } from '@/shared/shell/errorModel';
import { centreAt, frameAt, type Frame } from '@/shared/shell/frame';
import { solve, workspace, type ShellProblem, type ShellState } from '@/shared/shell/gaussNewton';
import { isFixed } from '@/shared/shell/known';
import type { MarkSet } from '@/shared/shell/markSet';
import { naturalValues } from '@/shared/shell/naturalParameters';
import { seededRandom, type Random } from '@/shared/random';
import { EXTRA_1, EXTRA_2, LN_W, V0 } from '@/shared/shell/shellModel';
import { drawUnseen } from '@/shared/shell/trace/tracedErrors';

export interface BootstrapOptions {
  seed: number;
  /** Draws from .. to - 1 of the sequence that the seed stands for. */
  from: number;
  to: number;
  onProgress?: (done: number) => void;
}

export interface BootstrapDraws {
  /** Natural parameters, one row a draw; v_exp is infinite in a draw that ran to its upper bound. */
  values: Float64Array;
  failed: number;
  unbounded: number;
}

/** Draws are refitted to this many standard errors: far below what a few hundred draws resolve. */
const TOLERANCE = 1e-3;
const PROGRESS_EVERY = 25;

/**
 * Channel-aware parametric bootstrap of a recentred solution (Efron & Tibshirani 1993, for the principle).
 *
 * Each draw makes a new reading: marks on the model rings, moved along their radii by errors with the four sources of
 * the error model, whose variances are themselves redrawn (scaled inverse chi-square), as they are known only from few
 * channels. The draw is refitted from the fitted values; the means of priors are redrawn about the fit. Marks set aside
 * stay out.
 *
 * Every draw has random numbers of its own, made from the seed and its number, so that draws 0 .. n - 1 are the same
 * bits whether they are made in one go or in parts by several threads.
 */
export function bootstrap(
  problem: ShellProblem,
  state: ShellState,
  errors: ErrorModel,
  options: BootstrapOptions,
): BootstrapDraws {
  const { model, marks, known } = problem;
  const { from, to } = options;
  const size = state.p.length;
  const fitted = naturalValues(model, state);
  const drawn: MarkSet = { ...marks, direction: new Float64Array(marks.direction.length) };
  const frame: Frame = {
    ...state.frame,
    along: new Float64Array(marks.count),
    eastward: new Float64Array(marks.count),
    northward: new Float64Array(marks.count),
  };
  const place = placer(problem, state, errors, drawn, frame);
  const draw = errorDrawer(problem, errors);
  const ws = workspace(marks, size);
  const e = new Float64Array(marks.count);
  const p = new Float64Array(size);
  const out: BootstrapDraws = { values: new Float64Array((to - from) * size), failed: 0, unbounded: 0 };

  for (let d = from; d < to; d++) {
    const random = randomOfDraw(options.seed, d);
    draw(e, random);
    place(e);
    const redrawn = known.map((k) => {
      if (k.prior === null) return k;
      const { sd } = k.prior;
      return { ...k, prior: { mean: fitted[k.index]! + sd * random.normal(), sd } };
    });
    p.set(state.p);
    const fit = solve({ model, marks: drawn, known: redrawn }, { frame, p }, { tolerance: TOLERANCE }, ws);
    const values = naturalValues(model, { frame, p });
    for (const k of known) if (k.fixed !== null) values[k.index] = k.fixed;
    drawUnseen(marks, values, (a) => !isFixed(known, a), random);
    if (fit.atBound === 'high' && p[LN_W]! > state.p[LN_W]!) {
      values[LN_W] = Infinity;
      out.unbounded++;
    } else if (!fit.settled || fit.atBound !== null) {
      out.failed++;
    }
    out.values.set(values, (d - from) * size);
    const made = d - from + 1;
    if (made % PROGRESS_EVERY === 0) options.onProgress?.(made / (to - from));
  }
  return out;
}

/** Draws made in parts, in their order, as one. */
export function joined(parts: readonly BootstrapDraws[]): BootstrapDraws {
  const values = new Float64Array(parts.reduce((sum, part) => sum + part.values.length, 0));
  let at = 0;
  for (const part of parts) {
    values.set(part.values, at);
    at += part.values.length;
  }
  return {
    values,
    failed: parts.reduce((sum, part) => sum + part.failed, 0),
    unbounded: parts.reduce((sum, part) => sum + part.unbounded, 0),
  };
}

/** The generator of one draw. Seeds of different draws differ: a step by an odd number visits all 32-bit numbers. */
const randomOfDraw = (seed: number, draw: number): Random =>
  seededRandom((Math.imul(seed, 0x2c1b3c6d) + Math.imul(draw + 1, 0x85ebca6b)) >>> 0);

/** A function that fills an array with one draw of scaled errors. */
function errorDrawer({ marks, known }: ShellProblem, errors: ErrorModel) {
  const { directions: d, scales } = errors;
  const noise = unsharedNoise(d, scales);
  const root = noise.map(Math.sqrt);
  const dof = channelDof(marks.blocks, known);
  const unsharedDof = Math.max(marks.count - marks.blocks - 2, 2);
  const shared = [
    { unit: d.unitA, full: d.a, scale: scales.shift, dof: dof.shift, source: 0 },
    { unit: d.unitB, full: d.b, scale: scales.shift, dof: dof.shift, source: 0 },
    { unit: d.unitU, full: d.u, scale: scales.ring, dof: dof.ring, source: 1 },
  ].map(({ unit, full, ...rest }) => {
    const square = blockProducts(marks, full, full);
    const own = blockProducts(
      marks,
      unit.map((q, i) => q * noise[i]!),
      unit,
    );
    const total = own.map((o, k) => Math.max(o + rest.scale * square[k]!, FLOOR * o));
    return { unit, own, total, ...rest };
  });

  return (e: Float64Array, random: Random): void => {
    const inflation = unsharedDof / random.chiSquare(unsharedDof);
    for (let i = 0; i < e.length; i++) e[i] = root[i]! * Math.sqrt(inflation) * random.normal();
    let source = -1;
    let redrawn = 1;
    for (const direction of shared) {
      if (direction.source !== source) redrawn = direction.dof / random.chiSquare(direction.dof); // one a source
      source = direction.source;
      // Along each channel's direction: shrink the component, or add to it, until it has the variance wanted.
      const component = blockProducts(marks, direction.unit, e);
      const change = component.map((value, k) => {
        const want = direction.total[k]! * redrawn;
        const have = direction.own[k]! * inflation;
        const keep = Math.sqrt(Math.min(want / Math.max(have, 1e-300), 1));
        return (keep - 1) * value + Math.sqrt(Math.max(want - have, 0)) * random.normal();
      });
      for (let i = 0; i < e.length; i++) e[i] = e[i]! + change[marks.block[i]!]! * direction.unit[i]!;
    }
  };
}

/**
 * A function that puts every mark on its model ring, moved along its own radius by scaled errors: its components in the
 * frame, and for an elliptical shell, which asks for it, its direction.
 */
function placer(
  { model, marks }: ShellProblem,
  { frame, p }: ShellState,
  errors: ErrorModel,
  drawn: MarkSet,
  into: Frame,
) {
  const { residual, variance } = errors.evaluation;
  const n = marks.count;
  const deviation = variance.map(Math.sqrt);
  const radius = new Float64Array(n);
  const ringCentre: MarkSet = { ...marks, direction: new Float64Array(3 * n) };
  const outward: MarkSet = { ...marks, direction: new Float64Array(3 * n) };
  for (let i = 0; i < n; i++) {
    const fromV0 = marks.velocity[marks.channel[i]!]! - p[V0]!;
    const c =
      model === 'drifting' ? centreAt(frame, p[EXTRA_1]! * fromV0, p[EXTRA_2]! * fromV0) : frame.origin;
    const q = marks.direction.subarray(3 * i, 3 * i + 3);
    const cosine = q[0]! * c[0] + q[1]! * c[1] + q[2]! * c[2];
    const off = [0, 1, 2].map((a) => q[a]! - cosine * c[a]!);
    const sine = Math.hypot(...off);
    ringCentre.direction.set(c, 3 * i);
    outward.direction.set(
      off.map((x) => x / Math.max(sine, 1e-12)),
      3 * i,
    );
    radius[i] = Math.atan2(sine, cosine) - residual[i]!;
  }
  const atCentre = frameAt(ringCentre, frame.origin);
  const atOut = frameAt(outward, frame.origin);
  return (e: Float64Array): void => {
    for (let i = 0; i < n; i++) {
      const angle = radius[i]! + e[i]! * deviation[i]!;
      const c = Math.cos(angle);
      const s = Math.sin(angle);
      into.along[i] = c * atCentre.along[i]! + s * atOut.along[i]!;
      into.eastward[i] = c * atCentre.eastward[i]! + s * atOut.eastward[i]!;
      into.northward[i] = c * atCentre.northward[i]! + s * atOut.northward[i]!;
      if (model !== 'elliptical') continue;
      for (let a = 3 * i; a < 3 * i + 3; a++)
        drawn.direction[a] = c * ringCentre.direction[a]! + s * outward.direction[a]!;
    }
  };
}

const ONE_SIGMA_TAIL = 0.1587;

/**
 * The 16th, 50th and 84th percentiles of one parameter over the draws (the nearest draw), angles unwrapped about the
 * fitted value first; half their distance is the standard deviation. Infinite where that share of the draws is unbounded.
 *
 * @param period 360 for a longitude, 180 for the direction of an axis
 * @param tail share of the draws below lo and above hi, if others than those percentiles are wanted
 */
export function percentiles(
  values: Float64Array,
  size: number,
  column: number,
  about: number,
  period?: number,
  tail = ONE_SIGMA_TAIL,
): { lo: number; median: number; hi: number; sd: number } {
  const draws = values.length / size;
  const sorted = Float64Array.from({ length: draws }, (_, d) => {
    const value = values[d * size + column]!;
    return period === undefined ? value : value - period * Math.round((value - about) / period);
  }).sort();
  const at = (share: number) => sorted[Math.round(share * (draws - 1))]!;
  const [lo, hi] = [at(tail), at(1 - tail)];
  return { lo, median: at(0.5), hi, sd: 0.5 * (hi - lo) };
}
