import { DEGREE } from '@/shared/sky/greatCircle';
import { numbered, type MarkSet, type UnseenErrors } from '@/shared/shell/markSet';
import { LN_W, THETA, V0 } from '@/shared/shell/shellModel';
import type { Random } from '@/shared/random';

/** How a rim was traced, as far as its errors depend on it. */
export interface TracedRim {
  /** Full width of the beam at half maximum, degrees. */
  beamDeg: number;
  /** The rim stands little above the noise. */
  faint: boolean;
}

/** Line width makes channels this close, km/s, show the same gas: they err together. */
const BLOCK = 5;
/** Errors that the scatter among traced places does not show, measured on cubes of known truth. */
const THETA_IN_BEAMS = 0.1;
const THETA_IN_BEAMS_FAINT = 0.2;
const V_SYS = 0.3;
const LN_V_EXP = 0.03;

/**
 * Which marks share errors: for a person's marks those of a channel, for a traced rim those of a block of 5 km/s; and
 * what a traced rim is wrong by that its scatter does not tell.
 */
export function errorBlocks(
  velocities: readonly number[],
  channelOf: readonly number[],
  traced: TracedRim | undefined,
): Pick<MarkSet, 'block' | 'blocks' | 'unseen'> {
  if (!traced) return { ...numbered(channelOf), unseen: null };
  const first = velocities.reduce((a, b) => Math.min(a, b), Infinity);
  const unseen: UnseenErrors = {
    theta: (traced.faint ? THETA_IN_BEAMS_FAINT : THETA_IN_BEAMS) * traced.beamDeg * DEGREE,
    v0: V_SYS,
    lnW: LN_V_EXP,
  };
  // velocities are rounded: one on the border of two blocks belongs to the upper
  return { ...numbered(velocities.map((v) => Math.floor((v - first) / BLOCK + 1e-9))), unseen };
}

const parts = (unseen: UnseenErrors): [parameter: number, sd: number][] => [
  [THETA, unseen.theta],
  [V0, unseen.v0],
  [LN_W, unseen.lnW],
];

/**
 * Add in quadrature what the scatter does not show, in place: to the variances of theta, v_sys and ln v_exp, where they
 * are free. It is known, not estimated, so it raises the degrees of freedom (Satterthwaite 1946).
 */
export function addUnseen(
  { unseen }: Pick<MarkSet, 'unseen'>,
  covariance: Float64Array,
  tDof: Float64Array,
  free: readonly number[],
): void {
  if (unseen === null) return;
  const size = tDof.length;
  for (const [a, sd] of parts(unseen)) {
    if (!free.includes(a)) continue;
    const seen = covariance[a * size + a]!;
    const all = seen + sd * sd;
    covariance[a * size + a] = all;
    if (seen > 0) tDof[a] = tDof[a]! * (all / seen) ** 2;
  }
}

/** The same for one draw of the bootstrap, in natural units (degrees, km/s), in place. */
export function drawUnseen(
  { unseen }: Pick<MarkSet, 'unseen'>,
  values: Float64Array,
  free: (parameter: number) => boolean,
  random: Random,
): void {
  if (unseen === null) return;
  for (const [a, sd] of parts(unseen)) {
    if (!free(a)) continue;
    const off = sd * random.normal();
    if (a === THETA) values[a] = values[a]! + off / DEGREE;
    else if (a === LN_W) values[a] = values[a]! * Math.exp(off);
    else values[a] = values[a]! + off;
  }
}
