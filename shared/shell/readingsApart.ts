import { DEGREE, separation } from '@/shared/sky/greatCircle';
import type { FitResult, Parameter } from '@/shared/shell/fitResult';

/** One parameter as two fits have it. */
export interface ParameterApart {
  parameter: 'theta' | 'vSys' | 'vExp' | 'centre';
  /** Second less first, in the parameter's unit; for the centre the angle between the two, degrees. */
  difference: number;
  unit: string;
  /** The difference over the two errors added in quadrature; null where one of them is not known. */
  inErrors: number | null;
}

/** How two fits of one shell differ. */
export interface ReadingsApart {
  parameters: ParameterApart[];
  /**
   * What two readings say of an error that is the same on all rings of one of them, and that its own scatter cannot
   * show: to be added to the variance of theta, deg^2, of either fit, or of the mean of the two where that is adopted.
   */
  thetaVariance: { single: number; mean: number };
  /** Standard errors of theta with that included, degrees: first, second, their mean. Null where it has none. */
  thetaSe: { first: number | null; second: number | null; mean: number | null };
  /** Sentences: how far apart they are, and what to do about it. */
  sentences: string[];
}

/** Differences up to so many combined errors are what chance brings; beyond the second number they are not. */
const AGREE = 2;
const CLASH = 3;

/**
 * Compare two fits of one shell by independent readings: two people's, or a person's and the rim traced from the
 * brightness. With readings of equal worth, (theta_1 - theta_2)^2/2 estimates the variance of what readings differ by;
 * their mean has half of that. Each fit's own error bars stay what they are: this comes on top.
 *
 * @param names whom the fits belong to, as they stand in a sentence
 * @throws RangeError where one has no theta, v_sys or v_exp
 */
export function readingsApart(
  first: Pick<FitResult, 'parameters'>,
  second: Pick<FitResult, 'parameters'>,
  names: [string, string] = ['the first reading', 'the second'],
): ReadingsApart {
  const [a, b] = [first.parameters, second.parameters];
  const parameters: ParameterApart[] = [
    centres(a, b),
    ...(['theta', 'vSys', 'vExp'] as const).map((name) => apart(name, known(a, name), known(b, name))),
  ];
  const theta = parameters.find((p) => p.parameter === 'theta')!;
  const single = theta.difference ** 2 / 2;
  const [seA, seB] = [known(a, 'theta').se, known(b, 'theta').se];
  const widened = (se: number | null, variance: number) =>
    se === null ? null : Math.sqrt(se ** 2 + variance);
  return {
    parameters,
    thetaVariance: { single, mean: single / 2 },
    thetaSe: {
      first: widened(seA, single),
      second: widened(seB, single),
      mean: seA === null || seB === null ? null : widened(Math.hypot(seA, seB) / 2, single / 2),
    },
    sentences: sentencesOf(parameters, single, known(a, 'theta'), names),
  };
}

function known(parameters: Record<string, Parameter>, name: string): Parameter {
  const found = parameters[name];
  if (!found || !Number.isFinite(found.value)) throw new RangeError(`A fit to compare has no ${name}.`);
  return found;
}

function apart(parameter: 'theta' | 'vSys' | 'vExp', a: Parameter, b: Parameter): ParameterApart {
  const difference = b.value - a.value;
  return { parameter, difference, unit: a.unit, inErrors: overErrors(difference, a.se, b.se) };
}

/** Distance of the centres, and that distance over the error along the line between them. */
function centres(a: Record<string, Parameter>, b: Record<string, Parameter>): ParameterApart {
  const [p, q] = [a, b].map((x) => ({ lon: known(x, 'l').value, lat: known(x, 'b').value })) as [
    { lon: number; lat: number },
    { lon: number; lat: number },
  ];
  const difference = separation(p, q);
  const shrink = Math.cos(p.lat * DEGREE); // errors of l are in degrees of the coordinate
  const dLon = ((q.lon - p.lon + 540) % 360) - 180;
  const [east, north] = [
    overErrors(dLon * shrink, scaled(a.l!.se, shrink), scaled(b.l!.se, shrink)),
    overErrors(q.lat - p.lat, a.b!.se, b.b!.se),
  ];
  const inErrors = east === null || north === null ? null : Math.hypot(east, north) / Math.SQRT2;
  return { parameter: 'centre', difference, unit: 'deg', inErrors };
}

const scaled = (se: number | null, factor: number) => (se === null ? null : se * factor);

function overErrors(difference: number, a: number | null, b: number | null): number | null {
  if (a === null || b === null) return null;
  const both = Math.hypot(a, b);
  return both > 0 ? Math.abs(difference) / both : null;
}

const LABELS = { theta: 'Θ', vSys: 'v_sys', vExp: 'v_exp', centre: 'the centre' } as const;

function sentencesOf(
  parameters: readonly ParameterApart[],
  variance: number,
  theta: Parameter,
  [first, second]: [string, string],
): string[] {
  const told = parameters.map(
    (p) =>
      `${LABELS[p.parameter]} ${p.parameter === 'centre' ? 'moved by' : p.difference < 0 ? 'smaller by' : 'larger by'} ` +
      `${rounded(Math.abs(p.difference))} ${p.unit}` +
      (p.inErrors === null ? '' : ` (${p.inErrors.toFixed(1)} combined errors)`),
  );
  const compared = parameters.filter((p) => p.inErrors !== null);
  const worst = compared.reduce((a, b) => (b.inErrors! > a.inErrors! ? b : a), compared[0]!);
  const out = [`Compared with ${first}, ${second} has ${told.join(', ')}.`];
  if (worst === undefined) return out;
  if (worst.inErrors! <= AGREE) out.push('They agree within their errors.');
  else
    out.push(
      `In ${LABELS[worst.parameter]} they differ by ${worst.inErrors! > CLASH ? 'far ' : ''}more than their errors allow: ` +
        'look at both on the map. One of them may follow another edge of the rim.',
    );
  if (theta.se !== null && variance > theta.se ** 2 / 4)
    out.push(
      `An error that all rings of a reading share shows only in such a comparison. Add ${rounded(Math.sqrt(variance))} deg ` +
        `in quadrature to the error of Θ, or ${rounded(Math.sqrt(variance / 2))} deg where the mean of the two is adopted.`,
    );
  return out;
}

const rounded = (value: number) => String(Number(value.toPrecision(2)));
