/**
 * OKLab, a space in which equal steps of L look like equal steps of lightness, and its way to and from sRGB.
 *
 * Björn Ottosson, "A perceptual color space for image processing" (2020), https://bottosson.github.io/posts/oklab/:
 * linear sRGB → cone responses (M₁) → cube roots → lightness and two opponent axes (M₂). The transfer curve of sRGB
 * is that of IEC 61966-2-1.
 */
export interface Oklab {
  /** 0 black … 1 white. */
  L: number;
  /** Green to red. */
  a: number;
  /** Blue to yellow. */
  b: number;
}

/** Red, green, blue as in a CSS colour, each 0 … 1. */
export type Srgb = readonly [number, number, number];

const toLinear = (c: number): number => (c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4);
const fromLinear = (c: number): number => (c <= 0.0031308 ? 12.92 * c : 1.055 * c ** (1 / 2.4) - 0.055);

export function toOklab([red, green, blue]: Srgb): Oklab {
  const [r, g, b] = [toLinear(red), toLinear(green), toLinear(blue)];
  const l = Math.cbrt(0.4122214708 * r + 0.5363325363 * g + 0.0514459929 * b);
  const m = Math.cbrt(0.2119034982 * r + 0.6806995451 * g + 0.1073969566 * b);
  const s = Math.cbrt(0.0883024619 * r + 0.2817188376 * g + 0.6299787005 * b);
  return {
    L: 0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
    a: 1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
    b: 0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
  };
}

/** The colour in sRGB; outside 0 … 1 where a screen cannot show it. */
export function fromOklab({ L, a, b }: Oklab): Srgb {
  const l = (L + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const m = (L - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const s = (L - 0.0894841775 * a - 1.291485548 * b) ** 3;
  return [
    fromLinear(4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s),
    fromLinear(-1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s),
    fromLinear(-0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s),
  ];
}

const shown = (c: number): boolean => c >= -1e-6 && c <= 1 + 1e-6;

/** The nearest colour a screen can show with the same lightness and hue: chroma is taken back until it fits. */
export function shownOklab(colour: Oklab): Srgb {
  const full = fromOklab(colour);
  if (full.every(shown)) return full;
  let [low, high] = [0, 1];
  for (let i = 0; i < 24; i++) {
    const middle = (low + high) / 2;
    const paler = fromOklab({ L: colour.L, a: colour.a * middle, b: colour.b * middle });
    if (paler.every(shown)) low = middle;
    else high = middle;
  }
  return fromOklab({ L: colour.L, a: colour.a * low, b: colour.b * low });
}
