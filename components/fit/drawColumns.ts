import type { FitDraws } from '@/shared/contract/fits';
import { ringRadius } from '@/shared/shell/ring';
import { roundRadius } from './fitFacts';
import { inOrder } from './parameterWords';

/** The draws of one parameter. */
export interface DrawColumn {
  name: string;
  /** One a draw, in the order of the draws; null where the draw has no bound. Longitudes and angles lie about `fitted`. */
  values: (number | null)[];
  fitted: number;
  /** How many of them have no bound. */
  unbounded: number;
}

const PERIOD: Record<string, number> = { l: 360, positionAngle: 180 };

/** The draws by parameter, in the usual order; a parameter that was held has none. */
export function drawColumns(draws: FitDraws, fitted: (name: string) => number | undefined): DrawColumn[] {
  return inOrder(draws.names).flatMap((name) => {
    const centre = fitted(name);
    if (centre === undefined) return [];
    const k = draws.names.indexOf(name);
    const period = PERIOD[name];
    const values = draws.rows.map((row) => {
      const value = row[k] ?? null;
      return value === null || period === undefined ? value : about(value, centre, period);
    });
    const column = { name, values, fitted: centre, unbounded: values.filter((v) => v === null).length };
    return values.every((v) => v === values[0]) ? [] : [column];
  });
}

/** The same direction, within half a period of a centre. */
const about = (value: number, centre: number, period: number): number =>
  value - period * Math.round((value - centre) / period);

/**
 * A percentile of draws of which some have no upper bound: those count as the largest.
 *
 * @param share 0 to 1
 * @returns null where the percentile falls among the unbounded; linear between neighbouring draws
 */
export function percentile(values: readonly (number | null)[], share: number): number | null {
  if (values.length === 0) return null;
  const sorted = values.map((v) => v ?? Infinity).sort((a, b) => a - b);
  const place = share * (sorted.length - 1);
  const below = sorted[Math.floor(place)]!;
  const above = sorted[Math.ceil(place)]!;
  const at = below === above ? below : below + (place - Math.floor(place)) * (above - below);
  return Number.isFinite(at) ? at : null;
}

const LOW = 0.1587;
const HIGH = 0.8413;

/**
 * The central 68 % of the ring radius at a velocity over the draws, degrees; a draw whose v_exp has no bound is a
 * cylinder, and one that closes before that velocity has radius 0. Null where a draw lacks the sphere's numbers.
 */
export function radiusBand(draws: FitDraws): ((velocity: number) => [number, number]) | null {
  const [t, s, e] = ['theta', 'vSys', 'vExp'].map((name) => draws.names.indexOf(name)) as [
    number,
    number,
    number,
  ];
  if (t < 0 || s < 0 || e < 0 || draws.rows.length < 20) return null;
  const q = draws.names.indexOf('axisRatio');
  return (velocity) => {
    const radii = draws.rows.map((row) => {
      const [larger, vSys, vExp] = [row[t], row[s], row[e]];
      if (larger == null || vSys == null) return 0;
      const theta = roundRadius(larger, row[q]);
      if (vExp == null) return theta;
      return theta > 0 && theta < 90 && vExp > 0 ? (ringRadius(velocity, { theta, vSys, vExp }) ?? 0) : 0;
    });
    return [percentile(radii, LOW) ?? 0, percentile(radii, HIGH) ?? 0];
  };
}
