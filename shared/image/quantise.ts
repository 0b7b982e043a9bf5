/** The number that stands for "no value here" in a quantised plane. */
export const BLANK = 65535;
const LEVELS = 65534;

/** Brightness as 16-bit numbers: brightness = offset + scale · number, except where the number is `blank`. */
export interface Quantised {
  values: Uint16Array;
  scale: number;
  offset: number;
  blank: number;
}

/**
 * Write a plane as 16-bit numbers spread evenly from its smallest to its largest value.
 *
 * NaN and ±Infinity become `BLANK`. The error is at most half of `scale` (plus one rounding in double precision),
 * and the extremes come back exactly. A plane of one value, or of none, has scale 1 and only the number 0.
 *
 * @param plane any length, in any unit
 */
export function quantise(plane: Float32Array): Quantised {
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < plane.length; i++) {
    const value = plane[i]!;
    if (value - value !== 0) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  const offset = low <= high ? low : 0;
  const scale = low < high ? (high - low) / LEVELS : 1;
  const values = new Uint16Array(plane.length);
  for (let i = 0; i < plane.length; i++) {
    const value = plane[i]!;
    // Assigning to a Uint16Array cuts off the fraction, so adding a half rounds.
    values[i] = value - value === 0 ? Math.min((value - offset) / scale + 0.5, LEVELS) : BLANK;
  }
  return { values, scale, offset, blank: BLANK };
}

/** The brightness of one 16-bit number; NaN for a blank. */
export const brightnessOf = (number: number, q: Omit<Quantised, 'values'>): number =>
  number === q.blank ? NaN : q.offset + q.scale * number;

/** Undo `quantise`, to within half of the scale; blanks become NaN. */
export function dequantise(q: Quantised): Float32Array {
  const plane = new Float32Array(q.values.length);
  for (let i = 0; i < plane.length; i++) plane[i] = brightnessOf(q.values[i]!, q);
  return plane;
}
