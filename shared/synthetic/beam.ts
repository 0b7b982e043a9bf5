/** FWHM of a Gaussian in standard deviations: 2 sqrt(2 ln 2). */
const FWHM = 2 * Math.sqrt(2 * Math.LN2);
/** Standard deviations on each side at which the kernel is cut; 2e-4 of it lies outside. */
const CUT = 3.75;

/** A Gaussian beam along the axes of a plane, ready to be applied to many planes. */
export interface Beam {
  /** Smooth a plane in place. Beyond an edge the edge's own values are repeated, so that a level stays level. */
  smooth(plane: Float32Array): void;
  /** Root mean square of white noise of unit variance after the beam. */
  noiseLeft: number;
}

/** @param fwhm full widths at half maximum along x and y, pixels */
export function gaussianBeam(nx: number, ny: number, fwhm: { x: number; y: number }): Beam {
  const kx = kernel(fwhm.x / FWHM);
  const ky = kernel(fwhm.y / FWHM);
  const scratch = new Float32Array(nx * ny);
  const power = (k: Float64Array) => k.reduce((sum, w) => sum + w * w, 0);
  return {
    smooth(plane) {
      convolve(plane, scratch, kx, { along: nx, stride: 1, lines: ny, step: nx });
      convolve(scratch, plane, ky, { along: ny, stride: nx, lines: nx, step: 1 });
    },
    noiseLeft: Math.sqrt(power(kx) * power(ky)),
  };
}

/** Weights of sum 1 at -n ... n pixels. */
function kernel(sigma: number): Float64Array {
  const n = Math.ceil(CUT * sigma);
  const weights = Float64Array.from({ length: 2 * n + 1 }, (_, i) => Math.exp(-0.5 * ((i - n) / sigma) ** 2));
  const sum = weights.reduce((a, b) => a + b, 0);
  return weights.map((w) => w / sum);
}

interface Lines {
  along: number;
  stride: number;
  lines: number;
  step: number;
}

function convolve(from: Float32Array, to: Float32Array, weights: Float64Array, lines: Lines): void {
  const { along, stride } = lines;
  const n = (weights.length - 1) / 2;
  const line = new Float64Array(along + 2 * n);
  for (let l = 0; l < lines.lines; l++) {
    const start = l * lines.step;
    for (let i = 0; i < line.length; i++)
      line[i] = from[start + stride * Math.min(Math.max(i - n, 0), along - 1)]!;
    for (let i = 0; i < along; i++) {
      let sum = 0;
      for (let j = 0; j < weights.length; j++) sum += weights[j]! * line[i + j]!;
      to[start + stride * i] = sum;
    }
  }
}
