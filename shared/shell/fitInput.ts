import { Problem } from '@/shared/contract/problem';
import { DEGREE, unitVector } from '@/shared/sky/greatCircle';
import type { Constraints } from '@/shared/shell/fitResult';
import { centroid, type MarkSet } from '@/shared/shell/markSet';
import { median } from '@/shared/shell/robust';
import { parameterCount, type ModelName } from '@/shared/shell/shellModel';
import { errorBlocks, type TracedRim } from '@/shared/shell/trace/tracedErrors';

/** A rim mark on the sky: galactic degrees, velocity of its channel in km/s, positional error in degrees. */
export interface SkyMark {
  l: number;
  b: number;
  velocity: number;
  sigma?: number;
  /** It was made, with others, by one circle that a person drew: their scatter about it says nothing of their error. */
  drawn?: boolean;
}

export interface FitInput {
  marks: readonly SkyMark[];
  /** Full width of a channel, km/s, positive. */
  channelWidth: number;
  /** A short way to say `constraints.vSys`: held at the value when sigma is 0 or absent, else a prior. km/s. */
  vSys?: { value: number; sigma?: number };
  /** What is known of parameters beforehand, by name; the cap model needs v_sys held or under a prior. */
  constraints?: Constraints;
  /** The marks are a rim traced from the brightness; see trace/README.md for what that adds to the errors. */
  traced?: TracedRim;
}

export const LEAST_MARKS = 6;
export const LEAST_CHANNELS = 3;
/** Marks whose velocities agree to this share of a channel lie on one channel. */
const SAME_CHANNEL = 1e-3;
/** Marks this close to one line, as a share of their extent, or of their error, trace no ring. */
const STRAIGHT = 2e-3;
const STRAIGHT_IN_SIGMA = 0.05;
/** rad: closer than 0.2 milliarcseconds is one point. */
const ONE_POINT = 1e-9;

/**
 * The input as flat arrays. A missing sigma is left NaN for the caller to replace.
 *
 * @throws Problem invalid-input (field names the value), marks-insufficient, marks-degenerate
 */
export function readMarks(input: FitInput, model: ModelName): MarkSet {
  checkNumbers(input);
  const { marks, channelWidth, traced } = input;
  const velocity: number[] = [];
  for (const v of marks.map((m) => m.velocity).sort((a, b) => a - b)) {
    const last = velocity[velocity.length - 1];
    if (last === undefined || v - last > SAME_CHANNEL * channelWidth) velocity.push(v);
  }
  const channelOf = marks.map((m) => {
    const above = velocity.findIndex((v) => v > m.velocity);
    return (above < 0 ? velocity.length : above) - 1;
  });
  const set: MarkSet = {
    count: marks.length,
    channels: velocity.length,
    direction: Float64Array.from(marks.flatMap((m) => [...unitVector({ lon: m.l, lat: m.b })])),
    sigma2: Float64Array.from(marks, (m) => ((m.sigma ?? NaN) * DEGREE) ** 2),
    channel: Int32Array.from(channelOf),
    velocity: Float64Array.from(velocity),
    width: channelWidth,
    drawn: marks.filter((m) => m.drawn).length,
    ...errorBlocks(
      marks.map((m) => m.velocity),
      channelOf,
      traced,
    ),
  };
  checkEnough(set, model);
  checkShape(set);
  return set;
}

function checkNumbers({ marks, channelWidth, traced }: FitInput): void {
  const refuse = (field: string, detail: string): never => {
    throw new Problem('invalid-input', detail, { field });
  };
  const finite = (value: unknown, field: string, what: string) => {
    if (typeof value !== 'number' || !Number.isFinite(value))
      refuse(field, `${what} must be a finite number, not ${String(value)}.`);
  };
  if (!Array.isArray(marks)) refuse('marks', 'Give the rim marks as a list.');
  marks.forEach((mark, i) => {
    finite(mark.l, `marks.${i}.l`, 'The longitude of a mark');
    finite(mark.b, `marks.${i}.b`, 'The latitude of a mark');
    finite(mark.velocity, `marks.${i}.velocity`, 'The velocity of a mark');
    if (Math.abs(mark.b) > 90)
      refuse(`marks.${i}.b`, `A latitude lies between -90 and 90 degrees; this one is ${mark.b}.`);
    if (mark.sigma === undefined) return;
    finite(mark.sigma, `marks.${i}.sigma`, 'The error of a mark');
    if (mark.sigma <= 0)
      refuse(`marks.${i}.sigma`, `The error of a mark must be positive; this one is ${mark.sigma} degrees.`);
  });
  if (traced !== undefined && !(Number.isFinite(traced.beamDeg) && traced.beamDeg > 0))
    refuse('traced.beamDeg', 'A traced rim needs the beam it was traced with, in degrees and above 0.');
  finite(channelWidth, 'channelWidth', 'The channel width');
  if (channelWidth <= 0)
    refuse('channelWidth', `The channel width must be positive; this one is ${channelWidth} km/s.`);
}

function checkEnough(marks: MarkSet, model: ModelName): void {
  const distinct = new Set<string>();
  for (let i = 0; i < marks.count; i++)
    distinct.add([marks.channel[i], ...marks.direction.subarray(3 * i, 3 * i + 3)].join());
  const needed = Math.max(LEAST_MARKS, parameterCount(model) + 1);
  if (marks.channels >= LEAST_CHANNELS && distinct.size >= needed) return;
  const found = `${counted(distinct.size, 'different mark')} on ${counted(marks.channels, 'channel')}`;
  const missing = [
    marks.channels < LEAST_CHANNELS
      ? `mark the rim on ${counted(LEAST_CHANNELS - marks.channels, 'more channel')}`
      : '',
    distinct.size < needed ? `add at least ${counted(needed - distinct.size, 'more mark')}` : '',
  ].filter(Boolean);
  throw new Problem(
    'marks-insufficient',
    `A shell needs at least ${needed} marks on ${LEAST_CHANNELS} channels, because one channel cannot tell size ` +
      `from expansion; there are ${found}. To go on, ${missing.join(' and ')}.`,
    { field: 'marks' },
  );
}

/** Refuse marks at one point or along one great circle: any number of shells passes through them. */
function checkShape(marks: MarkSet): void {
  const { extent, offLine } = spreadAboutLine(marks);
  const sigma = Math.sqrt(median(marks.sigma2));
  let where: string;
  if (extent < ONE_POINT) where = 'at one point';
  else if (offLine < STRAIGHT * extent || offLine < STRAIGHT_IN_SIGMA * sigma)
    where = 'along one straight line';
  else return;
  throw new Problem(
    'marks-degenerate',
    `All marks lie ${where}, so that no ring passes through them. Mark the rim around more of the shell.`,
    { field: 'marks' },
  );
}

/** Root mean squares, rad, along the longest direction of the marks about their centroid and across it. */
function spreadAboutLine(marks: MarkSet): { extent: number; offLine: number } {
  const middle = centroid(marks);
  // Vectors from the centroid; the part along the line of sight is second order and left out by projecting.
  const q = marks.direction;
  const m = [0, 0, 0, 0, 0, 0];
  for (let i = 0; i < q.length; i += 3) {
    const along = q[i]! * middle[0] + q[i + 1]! * middle[1] + q[i + 2]! * middle[2];
    const d = [0, 1, 2].map((a) => q[i + a]! - along * middle[a]!);
    m[0]! += d[0]! * d[0]!;
    m[1]! += d[1]! * d[1]!;
    m[2]! += d[2]! * d[2]!;
    m[3]! += d[0]! * d[1]!;
    m[4]! += d[0]! * d[2]!;
    m[5]! += d[1]! * d[2]!;
  }
  // Two non-zero eigenvalues: their sum is the trace, their product the sum of the principal minors.
  const [xx, yy, zz, xy, xz, yz] = m as [number, number, number, number, number, number];
  const trace = xx + yy + zz;
  const product = xx * yy - xy * xy + (xx * zz - xz * xz) + (yy * zz - yz * yz);
  const larger = 0.5 * (trace + Math.sqrt(Math.max(trace * trace - 4 * product, 0)));
  const smaller = larger > 0 ? Math.max(product, 0) / larger : 0;
  return { extent: Math.sqrt(larger / marks.count), offLine: Math.sqrt(smaller / marks.count) };
}

const counted = (n: number, what: string) => `${n} ${what}${n === 1 ? '' : 's'}`;
