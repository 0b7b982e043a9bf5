import { labelOf, niceTicks, type Ticks } from '@/shared/image/ticks';

/** Right ascension is told in hours of 15 degrees; all other angles in degrees. */
export type SexagesimalUnit = 'hours' | 'degrees';

const MINUS = '−';
const SIGNS: Record<SexagesimalUnit, readonly [string, string, string]> = {
  hours: ['ʰ', 'ᵐ', 'ˢ'],
  degrees: ['°', '′', '″'],
};

/**
 * An angle in degrees as hours or degrees, minutes and seconds: 17ʰ45ᵐ40.0ˢ, −28°56′10″.
 *
 * @param seconds digits after the point of the seconds; −1 leaves the seconds out, −2 the minutes too
 */
export function sexagesimal(degrees: number, unit: SexagesimalUnit, seconds: number): string {
  const [first, second, third] = SIGNS[unit];
  const parts = seconds <= -2 ? 1 : seconds === -1 ? 60 : 3600 * 10 ** seconds;
  const turn = unit === 'hours' ? 24 * parts : Infinity;
  const size = unit === 'hours' ? (((degrees / 15) % 24) + 24) % 24 : Math.abs(degrees);
  const rounded = Math.round(size * parts) % turn; // before taking apart, so that there is never a 60
  const whole = Math.floor(rounded / parts);
  const sign = unit === 'degrees' && degrees < 0 && rounded > 0 ? MINUS : '';
  const two = (n: number) => String(n).padStart(2, '0');
  const head = `${sign}${unit === 'hours' ? two(whole) : whole}${first}`;
  if (seconds <= -2) return head;
  const minutes = Math.floor(((rounded % parts) * 60) / parts);
  if (seconds === -1) return `${head}${two(minutes)}${second}`;
  const rest = (rounded % (parts / 60)) / (parts / 3600);
  return `${head}${two(minutes)}${second}${rest.toFixed(seconds).padStart(seconds > 0 ? 3 + seconds : 2, '0')}${third}`;
}

/** Steps that divide a whole evenly, in seconds. */
const STEPS = [1, 2, 5, 10, 15, 30, 60, 120, 300, 600, 900, 1800, 3600, 7200, 10_800, 21_600] as const;

export interface SexagesimalTicks extends Ticks {
  label: (value: number) => string;
}

/** Round values between two angles (degrees), as `niceTicks` gives decimal ones: whole seconds, minutes, hours … */
export function sexagesimalTicks(
  low: number,
  high: number,
  count: number,
  unit: SexagesimalUnit,
): SexagesimalTicks {
  const perUnit = unit === 'hours' ? 240 : 3600; // seconds a degree
  const span = (high - low) * perUnit;
  const rough = span / Math.max(count, 1);
  if (rough < 0.7 || rough > 40_000) {
    const fine = niceTicks(low * perUnit, high * perUnit, count);
    const values = fine.values.map((v) => v / perUnit);
    const digits = rough < 0.7 ? fine.decimals : -2;
    return { ...fine, values, step: fine.step / perUnit, label: (v) => sexagesimal(v, unit, digits) };
  }
  const step = STEPS.reduce((best, s) =>
    Math.abs(Math.log(s / rough)) < Math.abs(Math.log(best / rough)) ? s : best,
  );
  const digits = step >= 3600 ? -2 : step >= 60 ? -1 : 0;
  const values: number[] = [];
  for (let k = Math.ceil((low * perUnit) / step - 1e-9); k * step <= high * perUnit + 1e-9; k++)
    values.push((k * step) / perUnit);
  return { values, step: step / perUnit, decimals: 0, label: (v) => sexagesimal(v, unit, digits) };
}

/** Decimal degrees, as everywhere. */
export const decimalLabel = (value: number, decimals: number) => `${labelOf(value, decimals)}°`;
