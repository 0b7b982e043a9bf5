/** A number with its error as a fit gives it: se the standard error, lo and hi the 16th and 84th percentile. */
export interface QuantityInput {
  value: number;
  se: number | null;
  lo?: number | null;
  hi?: number | null;
  unit?: string;
}

export interface QuantityText {
  value: string;
  /** '± 0.7', '+1.2 −0.9', or null where no error is known. */
  error: string | null;
  unit: string;
  /** Value, error and unit on one line. */
  line: string;
  /** The same for the ear. */
  spoken: string;
}

const MINUS = '\u2212';

/**
 * How many decimals an error deserves: the leading digits of the error decide. Where they are 100 … 354 two
 * digits are kept, from 355 on one; 950 … 999 count as 1000 (two digits). Negative: places left of the point.
 *
 * @param error any positive number
 * @returns decimals, or null for an error that is nought, negative or not finite
 * Source: rounding rule of the Particle Data Group, Review of Particle Physics, Introduction 5.3.
 */
export function errorDecimals(error: number): number | null {
  if (!(error > 0) || !Number.isFinite(error)) return null;
  let exponent = Math.floor(Math.log10(error));
  let leading = Math.round((error / 10 ** exponent) * 100);
  if (leading >= 1000) {
    exponent += 1; // rounding carried over, as with 9.996
    leading = 100;
  }
  // from 950 on one decimal fewer than 1 − exponent makes 10 of 9.5: two digits at the same place as one digit
  return leading < 355 ? 1 - exponent : -exponent;
}

/** A number with this many decimals and a true minus sign; negative decimals round left of the point. */
export function fixed(value: number, decimals: number): string {
  const step = 10 ** -decimals;
  const text =
    decimals >= 0 ? value.toFixed(Math.min(decimals, 20)) : String(Math.round(value / step) * step);
  const negative = text.startsWith('-');
  const digits = negative ? text.slice(1) : text;
  return negative && /[1-9]/.test(digits) ? MINUS + digits : digits;
}

/** A number without an error to four significant digits, or fewer decimals where they are noughts. */
export function plainNumber(value: number, digits = 4): string {
  if (!Number.isFinite(value)) return '–';
  if (value === 0) return '0';
  const size = Math.floor(Math.log10(Math.abs(value)));
  if (size < -4 || size > 6) return value.toExponential(digits - 1).replace('-', MINUS);
  return fixed(value, Math.max(0, digits - 1 - size))
    .replace(/(\.\d*?)0+$/, '$1')
    .replace(/\.$/, '');
}

const spokenUnits: Record<string, string> = {
  '°': 'degrees',
  deg: 'degrees',
  'km/s': 'kilometres per second',
  'km/s/deg': 'kilometres per second and degree',
  'km/s/°': 'kilometres per second and degree',
  pc: 'parsecs',
  Myr: 'million years',
  K: 'kelvin',
};

/** deg is written °, everything else as it is. */
export const displayUnit = (unit: string): string => unit.replace(/\bdeg\b/, '°');

/** Sides that differ by less than this share of their mean are one error: the difference says nothing. */
const LOPSIDED = 0.15;

/**
 * Value, error and unit as the interface and tables print them, rounded by the error's leading digits.
 *
 * Where the two sides of the interval agree within 15 % the error is the standard error, as ± a; otherwise the sides
 * are given as +a −b, and a side without a bound as 'no upper bound'.
 *
 * @param quantity any finite value; se, lo, hi null where unknown (lo or hi null with the other given: unbounded)
 */
export function formatQuantity({ value, se, lo, hi, unit = '' }: QuantityInput): QuantityText {
  const shownUnit = displayUnit(unit);
  if (!Number.isFinite(value)) return assemble('–', null, null, shownUnit, unit);
  const below = lo == null || lo > value ? null : value - lo;
  const above = hi == null || hi < value ? null : hi - value;
  const even =
    below !== null && above !== null && Math.abs(above - below) <= (LOPSIDED * (above + below)) / 2;
  const single = below === null && above === null ? se : even ? (se ?? (above + below) / 2) : null;
  if (single !== null || (below === null && above === null)) {
    const decimals = errorDecimals(single ?? 0);
    if (decimals === null) return assemble(plainNumber(value), null, null, shownUnit, unit);
    const error = fixed(single!, decimals);
    return assemble(fixed(value, decimals), `± ${error}`, `plus or minus ${error}`, shownUnit, unit);
  }
  const decimals = errorDecimals(Math.min(above ?? Infinity, below ?? Infinity)) ?? 3;
  const side = (x: number | null) => (x === null ? null : fixed(x, decimals));
  const [a, b] = [side(above), side(below)];
  const written = `${a === null ? 'no upper bound' : `+${a}`} ${b === null ? 'no lower bound' : `${MINUS}${b}`}`;
  const heard = `${a === null ? 'no upper bound' : `plus ${a}`}, ${b === null ? 'no lower bound' : `minus ${b}`}`;
  return assemble(fixed(value, decimals), written, heard, shownUnit, unit);
}

function assemble(
  value: string,
  error: string | null,
  heard: string | null,
  shown: string,
  unit: string,
): QuantityText {
  const tight = shown === '°';
  const line = [value, error].filter(Boolean).join(' ') + (shown ? (tight ? shown : ` ${shown}`) : '');
  const number = value === '–' ? 'not known' : value.replace(MINUS, 'minus ');
  const spoken = [number, heard, spokenUnits[unit] ?? spokenUnits[shown] ?? shown].filter(Boolean).join(' ');
  return { value, error, unit: shown, line, spoken };
}
