/**
 * The ring radius that a channel of finite width shows.
 *
 * A shell of angular radius Theta expanding at w about v0 is seen at velocity v under the angle theta with
 * sin theta = sin Theta cos psi, sin psi = (v - v0)/w. A channel averages over its width, so its ring is taken as the
 * mean of sin theta over the part of the channel that lies inside the shell. With the edges y_a, y_b of that part (in
 * units of w, between -1 and 1), psi = asin y, d = psi_b - psi_a and p their mean, the integrals are elementary:
 *
 *     mean cos psi   = (d + sin d cos 2p) / (4 sin(d/2) cos p)        free of cancellation as the channel narrows
 *     mean cos^2 psi = 1 - (y_a^2 + y_a y_b + y_b^2)/3
 *
 * The spread of sin theta within the channel enters the weights as a variance. Nothing diverges at the caps, where
 * the plain curve has an infinite slope.
 */
export interface CurveTable {
  /** Expected ring radius of each channel, rad. Negative for a channel beyond a cap. */
  radius: Float64Array;
  /** Variance of the radius within the channel, rad^2. */
  variance: Float64Array;
  /** Derivatives of the radius with respect to Theta, v0 (km/s) and ln w. */
  dTheta: Float64Array;
  dV0: Float64Array;
  dLnW: Float64Array;
}

export function curveTable(channels: number): CurveTable {
  const column = () => new Float64Array(channels);
  return { radius: column(), variance: column(), dTheta: column(), dV0: column(), dLnW: column() };
}

/** A channel whose visible part is narrower than this share of its width (or 0.2 w) is continued along the tangent. */
const NARROWEST = 0.1;
const NARROWEST_IN_W = 0.2;
/** Keeps asin away from the horizon, where its slope is infinite. */
const SINE_LIMIT = 0.999999;

/**
 * Fill row k of the table for a channel centred on `velocity`. Angles in radians, velocities in km/s.
 *
 * @param width full width of the channel
 * @param theta angular radius Theta of the shell
 */
export function channelCurve(
  velocity: number,
  width: number,
  theta: number,
  v0: number,
  w: number,
  out: CurveTable,
  k: number,
): void {
  const du = width / w;
  const u = (velocity - v0) / w;
  const ua = u - du / 2;
  const ub = u + du / 2;
  const cutLow = ua < -1;
  const cutHigh = ub > 1;
  const visible = u > 0 ? 1 - ua : 1 + ub; // measured from the nearer cap; negative when the channel misses the shell
  const narrowest = Math.min(NARROWEST * du, NARROWEST_IN_W);

  let mean: number, spread: number, dV0: number, dLnW: number;
  if (cutLow !== cutHigh && visible < narrowest) {
    const h = narrowest;
    const root = Math.sqrt(h * (2 - h));
    const value = lessItsSine(4 * Math.asin(Math.sqrt(h / 2))) / (4 * h); // mean cos psi over a cap h deep
    const slope = (root - value) / h;
    const curvature = ((1 - h) / root - 2 * slope) / h;
    const dVisible = u > 0 ? ua : -ub;
    const dNarrowest = NARROWEST * du < NARROWEST_IN_W ? -h : 0;
    mean = value + slope * (visible - h);
    dV0 = ((u > 0 ? 1 : -1) * slope) / w;
    dLnW = slope * dVisible + curvature * (visible - h) * dNarrowest;
    const y = 1 - h;
    spread = Math.max(1 - (1 + y + y * y) / 3 - value * value, 0);
  } else {
    const ya = Math.min(Math.max(ua, -1), 1);
    const yb = Math.min(Math.max(ub, -1), 1);
    const pa = Math.asin(ya);
    const pb = Math.asin(yb);
    const d = Math.max(pb - pa, 1e-12);
    const cosMiddle = Math.max(Math.cos((pa + pb) / 2), 1e-12);
    const width2 = 2 * Math.sin(d / 2) * cosMiddle; // y_b - y_a, without the cancellation
    mean = (d + Math.sin(d) * Math.cos(pa + pb)) / (2 * width2);
    const edge = Math.max(width2, 1e-12);
    const dUb = cutHigh ? 0 : (Math.cos(pb) - mean) / edge;
    const dUa = cutLow ? 0 : (mean - Math.cos(pa)) / edge;
    dV0 = -(dUa + dUb) / w;
    dLnW = -(ua * dUa + ub * dUb);
    spread = Math.max(1 - (ya * ya + ya * yb + yb * yb) / 3 - mean * mean, 0);
  }

  const sinTheta = Math.sin(theta);
  const sine = Math.min(Math.max(sinTheta * mean, -SINE_LIMIT), SINE_LIMIT);
  const perCosine = 1 / Math.sqrt(1 - sine * sine);
  out.radius[k] = Math.asin(sine);
  out.variance[k] = sinTheta * sinTheta * spread * perCosine * perCosine;
  out.dTheta[k] = perCosine * Math.cos(theta) * mean;
  out.dV0[k] = perCosine * sinTheta * dV0;
  out.dLnW[k] = perCosine * sinTheta * dLnW;
}

/** x - sin x, by its series where the two agree in their leading digits. */
function lessItsSine(x: number): number {
  if (x > 0.5) return x - Math.sin(x);
  const q = x * x;
  return ((x * q) / 6) * (1 - (q / 20) * (1 - (q / 42) * (1 - (q / 72) * (1 - (q / 110) * (1 - q / 156)))));
}

/** The three numbers that fix the rings of a shell: degrees, km/s. */
export interface RingParameters {
  theta: number;
  vSys: number;
  vExp: number;
}

/**
 * Angular radius in degrees of the ring that a channel is expected to show, averaged over the channel as in the fit;
 * null for a channel that lies wholly beyond a cap. Use this to draw model rings.
 */
export function modelRadius(velocity: number, channelWidth: number, shell: RingParameters): number | null {
  if (Math.abs(velocity - shell.vSys) - channelWidth / 2 >= shell.vExp) return null;
  const one = curveTable(1);
  const theta = (shell.theta * Math.PI) / 180;
  channelCurve(velocity, channelWidth, theta, shell.vSys, shell.vExp, one, 0);
  return (Math.max(one.radius[0] ?? 0, 0) * 180) / Math.PI;
}
