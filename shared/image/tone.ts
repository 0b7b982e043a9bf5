import type { Quantised } from '@/shared/image/quantise';

/** The curve between the ends of the brightness window: both run from 0 at the dark end to 1 at the bright end. */
export interface ToneCurve {
  forward(t: number): number;
  inverse(s: number): number;
}

export const TONES = ['even', 'root', 'log', 'arcsinh'] as const;
export type Tone = (typeof TONES)[number];

/** How many times the faint end is steeper than a straight line; log goes further down than arcsinh. */
const LOG_REACH = 400;
const ARCSINH_REACH = 12;

export const TONE_CURVES: Record<Tone, ToneCurve> = {
  even: { forward: (t) => t, inverse: (s) => s },
  root: { forward: Math.sqrt, inverse: (s) => s * s },
  log: {
    forward: (t) => Math.log1p(LOG_REACH * t) / Math.log1p(LOG_REACH),
    inverse: (s) => Math.expm1(s * Math.log1p(LOG_REACH)) / LOG_REACH,
  },
  arcsinh: {
    forward: (t) => Math.asinh(ARCSINH_REACH * t) / Math.asinh(ARCSINH_REACH),
    inverse: (s) => Math.sinh(s * Math.asinh(ARCSINH_REACH)) / ARCSINH_REACH,
  },
};

export interface Look {
  /** Brightness at the dark and at the bright end, in the unit of the plane. */
  window: readonly [low: number, high: number];
  tone: Tone;
  /** Colours from the dark to the bright end, as 32-bit pixels. */
  ramp: Uint32Array;
  /** The pixel for a blank; 0 is transparent. */
  blank: number;
}

/** One pixel for each of the 65 536 numbers a quantised plane can hold. */
export type Lut = Uint32Array;

/**
 * The table from the numbers of one plane to pixels.
 *
 * Each colour of the ramp begins where the tone's inverse puts it, so building takes a few hundred evaluations and
 * not 65 536. Brightness at or beyond an end of the window takes the colour of that end; a window without width is a
 * step at its place.
 */
export function buildLut(q: Omit<Quantised, 'values'>, look: Look): Lut {
  const [low, high] = look.window;
  const { ramp } = look;
  const { inverse } = TONE_CURVES[look.tone];
  const steps = ramp.length - 1;
  const lut = new Uint32Array(65536);
  let from = 0;
  for (let k = 0; k <= steps; k++) {
    // Colour k stands for s between (k − ½)/steps and (k + ½)/steps.
    const until =
      k === steps
        ? lut.length
        : Math.ceil((low + (high - low) * inverse((k + 0.5) / steps) - q.offset) / q.scale);
    const to = Math.min(Math.max(until, from), lut.length);
    lut.fill(ramp[k]!, from, to);
    from = to;
  }
  lut[q.blank] = look.blank;
  return lut;
}

/** Turn a plane into pixels, number by number; `out` must have its length. */
export function paint(plane: Uint16Array, lut: Lut, out: Uint32Array): void {
  if (out.length !== plane.length)
    throw new RangeError(`${plane.length} numbers do not fill ${out.length} pixels`);
  for (let i = 0; i < plane.length; i++) out[i] = lut[plane[i]!]!;
}
