import { shownOklab, toOklab, type Oklab, type Srgb } from '@/shared/image/oklab';

export const PALETTES = ['Ink', 'Ember', 'Tide', 'Parting'] as const;
export type Palette = (typeof PALETTES)[number];

/** Stops from the dark to the bright end. Parting is two arms from a dark middle: for numbers about zero. */
const STOPS: Record<Palette, { arms: readonly (readonly string[])[] }> = {
  Ink: { arms: [['#06080F', '#3B404D', '#8B8F98', '#CFCDC7', '#F6F2E9']] },
  Ember: { arms: [['#0A0710', '#3D1130', '#8C2A2F', '#D1662F', '#F0B96A', '#FDF3D8']] },
  Tide: { arms: [['#050A18', '#0F2F52', '#14607A', '#3F9A92', '#98CFAE', '#F1F7E2']] },
  Parting: {
    arms: [
      ['#14161C', '#38306A', '#6F5FB4', '#AF9FE6', '#EAE4FF'],
      ['#14161C', '#36410F', '#6B7A1C', '#A8B648', '#E9F0B4'],
    ],
  },
};

export const RAMP_LENGTH = 512;

const bytesOf = (hex: string): Srgb => {
  const n = parseInt(hex.slice(1), 16);
  return [(n >> 16) / 255, ((n >> 8) & 255) / 255, (n & 255) / 255];
};

/** A pixel as a canvas stores it: red in the lowest byte (all machines that run browsers are little-endian). */
export const pixelOf = ([r, g, b]: Srgb, alpha = 1): number => {
  const byte = (c: number) => Math.round(Math.min(Math.max(c, 0), 1) * 255);
  return ((byte(alpha) << 24) | (byte(b) << 16) | (byte(g) << 8) | byte(r)) >>> 0;
};

/**
 * Colours along the stops with lightness rising evenly: at position t the lightness is that of the ends mixed by t,
 * and hue and chroma are those the path through the stops has at that lightness.
 */
function evenPath(stops: readonly string[]): (t: number) => Oklab {
  const path = stops.map((hex) => toOklab(bytesOf(hex)));
  const first = path[0]!;
  const last = path[path.length - 1]!;
  return (t) => {
    const L = first.L + (last.L - first.L) * t;
    const after = path.findIndex((stop, i) => i > 0 && stop.L >= L);
    const high = path[after < 0 ? path.length - 1 : after]!;
    const low = path[(after < 0 ? path.length - 1 : after) - 1]!;
    const part = (L - low.L) / (high.L - low.L);
    return { L, a: low.a + (high.a - low.a) * part, b: low.b + (high.b - low.b) * part };
  };
}

const ramps = new Map<string, Uint32Array>();

/** The palette's colours, dark end first, as `length` canvas pixels; worked out once, so not to be written into. */
export function rampOf(palette: Palette, length = RAMP_LENGTH): Uint32Array {
  const key = `${palette} ${length}`;
  const ramp = ramps.get(key) ?? newRamp(palette, length);
  ramps.set(key, ramp);
  return ramp;
}

function newRamp(palette: Palette, length: number): Uint32Array {
  const arms = STOPS[palette].arms.map(evenPath);
  const below = arms[0]!;
  const above = arms[1];
  return Uint32Array.from({ length }, (_, i) => {
    const t = i / (length - 1);
    const colour = !above ? below(t) : t < 0.5 ? below(1 - 2 * t) : above(2 * t - 1);
    return pixelOf(shownOklab(colour));
  });
}

/** A CSS gradient of the palette, for showing it in a control. */
export function cssGradient(palette: Palette, steps = 24): string {
  const hex = (p: number) =>
    `#${[p & 255, (p >> 8) & 255, (p >> 16) & 255].map((c) => c.toString(16).padStart(2, '0')).join('')}`;
  return `linear-gradient(to right, ${Array.from(rampOf(palette, steps), hex).join(', ')})`;
}
