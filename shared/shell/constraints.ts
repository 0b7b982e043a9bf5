import { Problem } from '@/shared/contract/problem';
import type { Constraint, Constraints } from '@/shared/shell/fitResult';
import type { Known } from '@/shared/shell/known';
import { EXTRA_1, PARAMETER_NAMES, PARAMETER_UNITS, V0, type ModelName } from '@/shared/shell/shellModel';

/** Names of the parameters in sentences. */
export const PARAMETER_WORDS: Record<string, string> = {
  l: 'the longitude',
  b: 'the latitude',
  theta: 'the radius',
  vSys: 'v_sys',
  vExp: 'v_exp',
  driftL: 'the drift in longitude',
  driftB: 'the drift in latitude',
  axisRatio: 'the axis ratio',
  positionAngle: 'the position angle',
};

/** What a parameter may be at all, in its own unit: a held value or a bound beyond it makes no shell. */
const POSSIBLE: Record<string, { low: number; high: number; openLow?: boolean; what: string }> = {
  b: { low: -90, high: 90, what: 'between -90 and 90 degrees' },
  theta: { low: 0, high: 83, openLow: true, what: 'more than 0 and at most 83 degrees' },
  vExp: { low: 0, high: Infinity, openLow: true, what: 'more than 0 km/s' },
  axisRatio: { low: 0.17, high: 1, what: 'between 0.17 and 1' },
};
const PERIOD: Record<string, number> = { l: 360, positionAngle: 180 };

/**
 * What is known of a model's parameters, checked, in falling order of index.
 *
 * Bounds of a longitude or of a position angle run from `low` upwards to `high` and may cross 0, as in 350 to 10; with
 * one bound alone half the circle is allowed.
 *
 * @throws Problem invalid-input, its field naming the value, as in `constraints.theta.low`
 */
export function readConstraints(
  model: ModelName,
  constraints: Constraints = {},
  vSys?: { value: number; sigma?: number },
): Known[] {
  const named = { ...constraints };
  if (vSys !== undefined) {
    checkVSys(vSys);
    if (named.vSys !== undefined)
      refuse('constraints.vSys', 'v_sys is given twice, as vSys and in the constraints. Give it once.');
    const { value, sigma = 0 } = vSys;
    named.vSys = sigma > 0 ? { prior: { mean: value, sd: sigma } } : { fixed: value };
  }
  const names = PARAMETER_NAMES[model];
  const known = Object.entries(named).flatMap(([name, constraint]) => {
    const index = names.indexOf(name);
    if (index < 0)
      refuse(
        `constraints.${name}`,
        `The ${model} model has no parameter "${name}". Its parameters: ${names.join(', ')}.`,
      );
    const one = readOne(name, index, constraint);
    return one === null ? [] : [one];
  });
  const axis = known.find((k) => k.index > EXTRA_1 && k.period !== null);
  if (axis && !known.some((k) => k.index === EXTRA_1)) known.push(unbounded(EXTRA_1, null));
  if (model === 'elliptical') for (const k of known) if (k.index === EXTRA_1) k.high = Math.min(k.high, 1);
  if (model === 'cap' && !known.some((k) => k.index === V0 && (k.fixed !== null || k.prior !== null)))
    refuse('vSys', 'The cap model needs v_sys: give its value, and its error unless it is to be held.');
  return known.sort((a, b) => b.index - a.index);
}

const refuse = (field: string, detail: string): never => {
  throw new Problem('invalid-input', detail, { field });
};

const unbounded = (index: number, period: number | null): Known => ({
  index,
  fixed: null,
  prior: null,
  low: -Infinity,
  high: Infinity,
  period,
  given: {},
});

function readOne(name: string, index: number, constraint: Constraint): Known | null {
  const path = `constraints.${name}`;
  const word = PARAMETER_WORDS[name]!;
  if (typeof constraint !== 'object' || constraint === null)
    refuse(path, `Say of ${word} that it is fixed, has a prior, or has bounds.`);
  const { fixed, prior, low, high } = constraint;
  const [hasFixed, hasPrior, hasLow, hasHigh] = [fixed, prior, low, high].map((v) => v !== undefined);
  if (!hasFixed && !hasPrior && !hasLow && !hasHigh) return null;
  if (hasFixed && (hasPrior || hasLow || hasHigh))
    refuse(path, `${capital(word)} cannot be fixed and free within limits at once. Keep one of the two.`);
  const known = unbounded(index, PERIOD[name] ?? null);
  known.given = constraint;
  if (hasFixed) known.fixed = possible(name, fixed, `${path}.fixed`);
  if (hasPrior) {
    const mean = finite(prior!.mean, `${path}.prior.mean`, `The mean of the prior on ${word}`);
    const sd = finite(prior!.sd, `${path}.prior.sd`, `The standard deviation of the prior on ${word}`);
    if (sd <= 0)
      refuse(`${path}.prior.sd`, `The standard deviation of a prior must be positive; this one is ${sd}.`);
    known.prior = { mean, sd };
  }
  if (hasLow) known.low = possible(name, low, `${path}.low`);
  if (hasHigh) known.high = possible(name, high, `${path}.high`);
  if (name === 'axisRatio' && known.fixed === 1)
    refuse(`${path}.fixed`, 'An ellipse of axis ratio 1 is a circle: fit the sphere instead.');
  if (known.period === null) {
    if (known.low >= known.high)
      refuse(`${path}.low`, `The lower bound of ${word}, ${low}, is not below the upper one, ${high}.`);
  } else if (hasLow || hasHigh) closeCircle(known, hasLow!, hasHigh!, path, word);
  return known;
}

/** Bounds of a parameter with a period as an interval that may pass beyond the period. */
function closeCircle(k: Known, hasLow: boolean, hasHigh: boolean, path: string, word: string): void {
  const period = k.period!;
  if (!hasLow) k.low = k.high - period / 2;
  if (!hasHigh) k.high = k.low + period / 2;
  const width = k.high - k.low - period * Math.floor((k.high - k.low) / period);
  if (width === 0) refuse(`${path}.low`, `The bounds of ${word} are the same direction: they leave nothing.`);
  k.high = k.low + width;
}

function possible(name: string, value: unknown, field: string): number {
  const number = finite(value, field, `The value for ${PARAMETER_WORDS[name]}`);
  const range = POSSIBLE[name];
  if (range && (number < range.low || number > range.high || (range.openLow && number === range.low)))
    refuse(field, `${capital(PARAMETER_WORDS[name]!)} must be ${range.what}; this is ${number}.`);
  return number;
}

function finite(value: unknown, field: string, what: string): number {
  if (typeof value !== 'number' || !Number.isFinite(value))
    refuse(field, `${what} must be a finite number, not ${String(value)}.`);
  return value as number;
}

function checkVSys({ value, sigma }: { value: number; sigma?: number }): void {
  finite(value, 'vSys.value', 'v_sys');
  if (sigma === undefined) return;
  if (finite(sigma, 'vSys.sigma', 'The error of v_sys') < 0)
    refuse('vSys.sigma', 'The error of v_sys cannot be negative; 0 holds v_sys.');
}

const capital = (text: string) => text[0]!.toUpperCase() + text.slice(1);

/** A constraint in words: "held at 5.6 km/s", "prior 5.6 ± 1 km/s", "within 10 to 20 km/s". */
export function inWords(name: string, { fixed, prior, low, high }: Constraint): string {
  const unit = PARAMETER_UNITS[name] ? ` ${PARAMETER_UNITS[name]}` : '';
  if (fixed !== undefined) return `held at ${fixed}${unit}`;
  const parts: string[] = [];
  if (prior) parts.push(`prior ${prior.mean} \u00b1 ${prior.sd}${unit}`);
  if (low !== undefined && high !== undefined) parts.push(`within ${low} to ${high}${unit}`);
  else if (low !== undefined) parts.push(`at least ${low}${unit}`);
  else if (high !== undefined) parts.push(`at most ${high}${unit}`);
  return parts.join(', ');
}
