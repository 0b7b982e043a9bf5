/**
 * Student's t and Fisher's F through the regularised incomplete beta function.
 */

/** ln Gamma for positive arguments: Stirling's series above 10, recurrence below. Relative error under 1e-14. */
export function lnGamma(x: number): number {
  let shift = 0;
  while (x < 10) shift -= Math.log(x++);
  const r = 1 / (x * x);
  const series =
    (1 / 12 - r * (1 / 360 - r * (1 / 1260 - r * (1 / 1680 - r * (1 / 1188 - (r * 691) / 360360))))) / x;
  return shift + (x - 0.5) * Math.log(x) - x + 0.5 * Math.log(2 * Math.PI) + series;
}

/**
 * Regularised incomplete beta function I_x(a, b) for a, b > 0 and x in [0, 1], by its continued fraction evaluated
 * after Lentz, in the half where it converges fast.
 */
export function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  if (x > (a + 1) / (a + b + 2)) return 1 - incompleteBeta(1 - x, b, a);
  const front = Math.exp(a * Math.log(x) + b * Math.log1p(-x) + lnGamma(a + b) - lnGamma(a) - lnGamma(b));
  const tiny = 1e-300;
  let c = 1;
  let d = 1 / nonZero(1 - ((a + b) * x) / (a + 1), tiny);
  let fraction = d;
  for (let m = 1; m < 10000; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / nonZero(1 + even * d, tiny);
    c = nonZero(1 + even / c, tiny);
    fraction *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / nonZero(1 + odd * d, tiny);
    c = nonZero(1 + odd / c, tiny);
    fraction *= d * c;
    if (Math.abs(d * c - 1) < 1e-15) break;
  }
  return (front * fraction) / a;
}

const nonZero = (value: number, tiny: number) => (Math.abs(value) < tiny ? tiny : value);

/** Probability that a t deviate with nu degrees of freedom lies within +-t. */
export function centralProbability(t: number, nu: number): number {
  return incompleteBeta((t * t) / (nu + t * t), 0.5, nu / 2);
}

/** Probability that an F deviate with m and n degrees of freedom exceeds f. */
export function upperF(f: number, m: number, n: number): number {
  return f <= 0 ? 1 : incompleteBeta(n / (n + m * f), n / 2, m / 2);
}

/** The central 68.27 % of a distribution: one standard deviation of a normal one. */
export const ONE_SIGMA = 0.6827;

/**
 * Half the width of the central interval that holds the probability `level`, in standard errors, for nu >= 1 degrees
 * of freedom (not necessarily whole): Newton's method inside a bracket. Relative error under 1e-12.
 */
export function tHalfWidth(nu: number, level = ONE_SIGMA): number {
  let low = 0;
  let high = 1;
  while (centralProbability(high, nu) < level) high *= 2;
  const lnFront = Math.log(2) + lnGamma((nu + 1) / 2) - lnGamma(nu / 2) - 0.5 * Math.log(nu * Math.PI);
  let t = 1;
  for (let i = 0; i < 60; i++) {
    const error = centralProbability(t, nu) - level;
    if (error > 0) high = t;
    else low = t;
    const density = Math.exp(lnFront - ((nu + 1) / 2) * Math.log1p((t * t) / nu));
    let next = t - error / density;
    if (!(next > low && next < high)) next = 0.5 * (low + high);
    if (Math.abs(next - t) < 1e-14 * t) return next;
    t = next;
  }
  return t;
}
