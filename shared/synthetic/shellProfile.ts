import type { ShellRecipe } from './recipe';

/**
 * How a shell looks along a radius in each channel, before clumps and the beam.
 *
 * With p the impact parameter of a line of sight and z the distance along it, both in shell radii, the gas at
 * r = sqrt(p^2 + z^2) moves along the line at u = z/r times vExp. So
 *
 *     rim(p, v)   ~ integral dz exp(-(r - 1)^2 / (2 thickness^2)) N(v; vSys + u vExp, dispersion)
 *     inside(p, v) = share of N(v; v', dispersion) over those v' whose ring lies outside p, softened by the thickness
 *
 * where N also takes in the width of the channel. p = sin(angle from the centre) / sin(theta) holds at any distance.
 */
export interface ShellProfile {
  /** p at the end of the table; beyond it there is nothing. */
  reach: number;
  /** Rows of `steps` + 1 values for p = 0 ... reach, one a channel. Rim: 1 at the brightest place at vSys. */
  steps: number;
  rim: Float32Array;
  /** 0 outside ... 1 in the interior. */
  inside: Float32Array;
}

const STEPS = 480;
/** Half the number of bins of u between -1 and 1. */
const BINS = 120;
/** Of the Gaussian profile, in thicknesses. */
const CUT = 4;
const DEPTHS = 400;

export function shellProfile(
  shell: ShellRecipe,
  velocities: readonly number[],
  channelWidth: number,
): ShellProfile {
  const reach = 1 + CUT * shell.thickness;
  const sigma = Math.sqrt(shell.dispersion ** 2 + channelWidth ** 2 / 12) / shell.vExp;
  const response = (u: number) => kernel(u, sigma);
  const rows = velocities.map((v) => response((v - shell.vSys) / shell.vExp));
  const central = response(0);
  const rim = new Float32Array((STEPS + 1) * velocities.length);
  const inside = new Float32Array((STEPS + 1) * velocities.length);
  let brightest = 0;
  for (let s = 0; s <= STEPS; s++) {
    const p = (reach * s) / STEPS;
    const light = lightByVelocity(p, shell.thickness);
    const cavity = cavityByVelocity(p, shell.thickness);
    brightest = Math.max(brightest, dot(light, central));
    rows.forEach((row, k) => {
      rim[k * (STEPS + 1) + s] = dot(light, row);
      inside[k * (STEPS + 1) + s] = Math.min(dot(cavity, row), 1);
    });
  }
  for (let i = 0; i < rim.length; i++) rim[i] = rim[i]! / brightest;
  return { reach, steps: STEPS, rim, inside };
}

/** Light of one line of sight over u, in bins of 1/BINS from -1 to 1. */
function lightByVelocity(p: number, thickness: number): Float64Array {
  const light = new Float64Array(2 * BINS + 1);
  const deep = Math.sqrt(Math.max((1 + CUT * thickness) ** 2 - p * p, 0));
  if (deep === 0) return light;
  for (let i = 0; i < DEPTHS; i++) {
    const z = deep * ((2 * (i + 0.5)) / DEPTHS - 1);
    const r = Math.hypot(p, z);
    const density = Math.exp(-0.5 * ((r - 1) / thickness) ** 2) * (deep / DEPTHS);
    const at = BINS * (1 + z / r);
    const bin = Math.min(Math.floor(at), 2 * BINS - 1);
    light[bin] = light[bin]! + density * (bin + 1 - at);
    light[bin + 1] = light[bin + 1]! + density * (at - bin);
  }
  return light;
}

/** Whether p lies inside the ring at u, with an edge as soft as the layer; times the width of a bin. */
function cavityByVelocity(p: number, thickness: number): Float64Array {
  return Float64Array.from({ length: 2 * BINS + 1 }, (_, i) => {
    const u = i / BINS - 1;
    const edge = Math.sqrt(1 - u * u) - thickness;
    return 1 / (1 + Math.exp((2 * (p - edge)) / thickness)) / BINS;
  });
}

/** The normal density about u, of standard deviation sigma, over the bins. */
function kernel(u: number, sigma: number): Float64Array {
  const scale = 1 / (sigma * Math.sqrt(2 * Math.PI));
  return Float64Array.from(
    { length: 2 * BINS + 1 },
    (_, i) => scale * Math.exp(-0.5 * ((i / BINS - 1 - u) / sigma) ** 2),
  );
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}
