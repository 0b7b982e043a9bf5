import { modelRadius } from '@/shared/shell/channelCurve';
import { evaluation, frameAt } from '@/shared/shell/frame';
import type { SkyMark } from '@/shared/shell/fitInput';
import type { MarkSet } from '@/shared/shell/markSet';
import { invert } from '@/shared/shell/normalEquations';
import { evaluate } from '@/shared/shell/residuals';
import { LN_W, X, Y } from '@/shared/shell/shellModel';
import { DEGREE, destination, positionAngle, unitVector } from '@/shared/sky/greatCircle';

export interface NextTask {
  marks: readonly (SkyMark & { channel: number })[];
  /** The fit as it stands: degrees, km/s. */
  shell: { l: number; b: number; theta: number; vSys: number; vExp: number };
  /** Full width of a channel, km/s. */
  channelWidth: number;
  velocities: readonly number[];
  /** Error of a mark to come, and of marks without one of their own: degrees. */
  sigma: number;
  /** What the marks of one ring err by together, degrees; 0 where it is not known. */
  shared: number;
  /** Marks of a ring to come; 8 by default. */
  ringMarks?: number;
}

export interface NextChannel {
  channel: number;
  velocity: number;
  /** By which share a ring there would lessen the variance of ln v_exp, and of the centre's place. */
  expansion: number;
  centre: number;
  /** ln of both variances now over then, added: what the channels are ordered by. */
  gain: number;
}

/** What the order of the channels means, for who asks. */
export const WHERE_NEXT =
  'For each unmarked channel that the model reaches: how far a ring of eight marks there, over the arc you marked so far, ' +
  'would lessen the variances of ln v_exp and of the centre, to first order.';

const SIZE = 5;
/** Marks that leave less than this free go all the way round, degrees. */
const OPEN = 90;

/**
 * Where marks would help most: every unmarked channel within the model's span, the most telling first.
 *
 * The information of a ring is J' V^-1 J, with the derivatives J of the residuals at the fit and the covariance V of
 * its marks: their own variance, the spread of radii within the channel, and what a ring's marks err by together. It is
 * added to that of the marks there are, and the variances are read off the inverse. Empty where the marks there are
 * leave a parameter free: then any ring helps.
 */
export function whereNext(task: NextTask): NextChannel[] {
  const { marks, shell, channelWidth, velocities } = task;
  const marked = new Set(marks.map((mark) => mark.channel));
  const now = new Float64Array(SIZE * SIZE);
  for (const channel of marked)
    addInformation(
      now,
      marks.filter((mark) => mark.channel === channel),
      task,
    );
  const before = variances(now);
  if (!before) return [];
  const angles = arcAngles(task);
  const centre = { lon: shell.l, lat: shell.b };
  return velocities
    .flatMap((velocity, channel): NextChannel[] => {
      const radius = modelRadius(velocity, channelWidth, shell);
      if (marked.has(channel) || Math.abs(velocity - shell.vSys) >= shell.vExp || !radius) return [];
      const ring = angles.map((angle) => {
        const { lon, lat } = destination(centre, angle, radius);
        return { l: lon, b: lat, velocity };
      });
      const then = Float64Array.from(now);
      addInformation(then, ring, task);
      const after = variances(then);
      if (!after) return [];
      const [expansion, place] = [after.expansion / before.expansion, after.centre / before.centre];
      const gain = -Math.log(expansion) - Math.log(place);
      return [{ channel, velocity, expansion: 1 - expansion, centre: 1 - place, gain }];
    })
    .sort((a, b) => b.gain - a.gain);
}

/** The best few that are not neighbours of each other: a ring on one tells most of what one beside it would. */
export function bestApart(channels: readonly NextChannel[], apart: number, most = 3): NextChannel[] {
  const best: NextChannel[] = [];
  for (const channel of channels) {
    if (best.length === most || channel.gain < channels[0]!.gain / 2) break;
    if (best.every((other) => Math.abs(other.velocity - channel.velocity) >= apart)) best.push(channel);
  }
  return best;
}

/** Add what the marks of one channel tell: with V = D + t^2 1 1', J'V^-1 J = J'D^-1 J - t^2/(1 + t^2 s) g g'. */
function addInformation(sum: Float64Array, marks: readonly SkyMark[], task: NextTask): void {
  const { shell, channelWidth, sigma, shared } = task;
  const set: MarkSet = {
    count: marks.length,
    channels: 1,
    direction: Float64Array.from(marks.flatMap((m) => [...unitVector({ lon: m.l, lat: m.b })])),
    sigma2: Float64Array.from(marks, (m) => ((m.sigma ?? sigma) * DEGREE) ** 2),
    channel: new Int32Array(marks.length),
    velocity: Float64Array.of(marks[0]!.velocity),
    width: channelWidth,
    block: new Int32Array(marks.length),
    blocks: 1,
    unseen: null,
    drawn: 0,
  };
  const frame = frameAt(set, unitVector({ lon: shell.l, lat: shell.b }));
  const p = Float64Array.of(0, 0, shell.theta * DEGREE, shell.vSys, Math.log(shell.vExp));
  const { jacobian: J, variance, ...rest } = evaluation(set, SIZE);
  evaluate('sphere', set, frame, p, { jacobian: J, variance, ...rest });
  const g = new Float64Array(SIZE);
  let s = 0;
  for (let i = 0; i < set.count; i++) {
    const weight = 1 / variance[i]!;
    s += weight;
    for (let a = 0; a < SIZE; a++) {
      g[a] = g[a]! + weight * J[i * SIZE + a]!;
      for (let b = 0; b < SIZE; b++)
        sum[a * SIZE + b] = sum[a * SIZE + b]! + weight * J[i * SIZE + a]! * J[i * SIZE + b]!;
    }
  }
  const t2 = (shared * DEGREE) ** 2;
  const lost = t2 / (1 + t2 * s);
  for (let a = 0; a < SIZE; a++)
    for (let b = 0; b < SIZE; b++) sum[a * SIZE + b] = sum[a * SIZE + b]! - lost * g[a]! * g[b]!;
}

function variances(information: Float64Array): { expansion: number; centre: number } | null {
  if (information.some((value, at) => at % (SIZE + 1) === 0 && !(value > 0))) return null;
  const inverse = invert(SIZE, information);
  if (!inverse) return null;
  const at = (i: number) => inverse[i * (SIZE + 1)]!;
  const [expansion, centre] = [at(LN_W), at(X) + at(Y)];
  return expansion > 0 && centre > 0 ? { expansion, centre } : null;
}

/** Directions of a ring's marks: over the arc that carries marks, or all round where they leave little of it open. */
function arcAngles({ marks, shell, ringMarks = 8 }: NextTask): number[] {
  const centre = { lon: shell.l, lat: shell.b };
  const angles = marks.map((m) => positionAngle(centre, { lon: m.l, lat: m.b })).sort((a, b) => a - b);
  let [gap, from] = [0, 0];
  angles.forEach((angle, i) => {
    const next = angles[i + 1] ?? angles[0]! + 360;
    if (next - angle > gap) [gap, from] = [next - angle, next];
  });
  const closed = gap < OPEN;
  const length = closed ? 360 : 360 - gap;
  const spacing = length / (closed ? ringMarks : ringMarks - 1);
  return Array.from({ length: ringMarks }, (_, i) => from + i * spacing);
}
