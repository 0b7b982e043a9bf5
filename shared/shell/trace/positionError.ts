export interface RimOnNoise {
  edge: 'ridge' | 'inner';
  /** Noise of the profile before it was smoothed. */
  noise: number;
  /** Full width of the beam. */
  beam: number;
  /** Second difference at the crest of the profile (ridge) or of its slope (inner): negative, 0 where it is not known. */
  curvature: number;
  /** The error is never given as larger. */
  most: number;
}

/** What is left with perfect data, in beams: clumps, thickness and line width put the crest off the ring. Measured. */
const LEAST_IN_BEAMS = 0.35;
const FWHM = 2 * Math.sqrt(2 * Math.LN2);

/**
 * Standard error of the rim's place along a radius; all lengths in samples of the profile.
 *
 * Noise n moves the crest of a profile p by n'/|p''|. Noise seen through a beam of standard deviation s_b is correlated
 * as exp(-x^2/(4 s_b^2)); smoothing by half a beam turns s_b^2 into L^2 = 1.25 s_b^2 and its variance into 1/sqrt(1.25)
 * of itself. From the derivatives of that function at 0, n' has the variance var/(2 L^2) and n'' 3 var/(4 L^4), which is
 * what moves the steepest place. To this the scatter that does not come from noise is added in quadrature.
 */
export function positionError({ edge, noise, beam, curvature, most }: RimOnNoise): number {
  const left = noise * Math.sqrt(1 / Math.sqrt(1.25));
  const L = (beam / FWHM) * Math.sqrt(1.25);
  const moving = edge === 'ridge' ? left / (Math.SQRT2 * L) : (Math.sqrt(3) * left) / (2 * L * L);
  const fromNoise = curvature < 0 ? moving / -curvature : most;
  return Math.min(Math.hypot(LEAST_IN_BEAMS * beam, fromNoise), Math.max(most, LEAST_IN_BEAMS * beam));
}
