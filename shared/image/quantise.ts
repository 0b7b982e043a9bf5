/** The number that stands for "no value here" in a quantised plane. */
export const BLANK = 65535;

/** Brightness as 16-bit numbers: brightness = offset + scale · number, except where the number is `blank`. */
export interface Quantised<Values = Uint16Array> {
  values: Values;
  scale: number;
  offset: number;
  blank: number;
}

/**
 * Write a plane as 16-bit numbers spread evenly from its smallest to its largest value.
 *
 * NaN and ±Infinity become the blank number. The error is at most half of `scale` (plus one rounding in double precision),
 * and the extremes come back exactly. A plane of one value, or of none, has scale 1 and only the number 0.
 *
 * @param plane any length, in any unit
 */
export function quantise(plane: Float32Array): Quantised;
/** @param bits 16, or 8: a quarter of a per cent of the range instead of a hundred-thousandth, and 255 is blank */
export function quantise(plane: Float32Array, bits: 8 | 16): Quantised<Uint8Array | Uint16Array>;
export function quantise(plane: Float32Array, bits: 8 | 16 = 16): Quantised<Uint8Array | Uint16Array> {
  const blank = bits === 8 ? 255 : BLANK;
  const levels = blank - 1;
  let low = Infinity;
  let high = -Infinity;
  for (let i = 0; i < plane.length; i++) {
    const value = plane[i]!;
    if (value - value !== 0) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  const offset = low <= high ? low : 0;
  const scale = low < high ? (high - low) / levels : 1;
  const values = bits === 8 ? new Uint8Array(plane.length) : new Uint16Array(plane.length);
  for (let i = 0; i < plane.length; i++) {
    const value = plane[i]!;
    // Assigning to an integer array cuts off the fraction, so adding a half rounds.
    values[i] = value - value === 0 ? Math.min((value - offset) / scale + 0.5, levels) : blank;
  }
  return { values, scale, offset, blank };
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
