import type { SpectralType, VelocityConvention } from './wcsSpec';

/** Speed of light, m/s (exact). */
export const SPEED_OF_LIGHT = 299_792_458;
/** Planck's constant, J s (exact, SI 2019). */
const PLANCK = 6.62607015e-34;
/** Rest frequency of the hyperfine line of neutral hydrogen, Hz (hydrogen-maser value, the one usual in headers). */
export const HYDROGEN_HZ = 1_420_405_751.768;

/**
 * Velocity of a frequency, m/s, positive away (Greisen et al. 2006, A&A 446, 747, table 3):
 *
 *     radio c (1 - f/f0), optical c (f0/f - 1), relativistic c (f0^2 - f^2)/(f0^2 + f^2)
 */
export function velocityOfFrequency(convention: VelocityConvention, hz: number, restHz: number): number {
  const c = SPEED_OF_LIGHT;
  if (convention === 'radio') return (c * (restHz - hz)) / restHz;
  if (convention === 'optical') return (c * (restHz - hz)) / hz;
  return (c * (restHz - hz) * (restHz + hz)) / (restHz * restHz + hz * hz);
}

/** Frequency in Hz of a velocity in m/s: the inverse of `velocityOfFrequency`. */
export function frequencyOfVelocity(
  convention: VelocityConvention,
  velocity: number,
  restHz: number,
): number {
  const beta = velocity / SPEED_OF_LIGHT;
  if (convention === 'radio') return restHz * (1 - beta);
  if (convention === 'optical') return restHz / (1 + beta);
  return restHz * Math.sqrt((1 - beta) / (1 + beta));
}

/** One kind of spectral coordinate (SI) against frequency: value, inverse, and slope d frequency / d value. */
export interface SpectralQuantity {
  frequency(value: number, restHz: number): number;
  value(hz: number, restHz: number): number;
  slope(value: number, restHz: number): number;
  /** Whether a rest frequency enters. */
  needsRest: boolean;
  /** The convention its velocity is given in. */
  convention: VelocityConvention;
}

const velocity = (convention: VelocityConvention, unit: number): SpectralQuantity => ({
  frequency: (v, rest) => frequencyOfVelocity(convention, v * unit, rest),
  value: (hz, rest) => velocityOfFrequency(convention, hz, rest) / unit,
  slope(v, rest) {
    const beta = (v * unit) / SPEED_OF_LIGHT;
    const scale = (-rest * unit) / SPEED_OF_LIGHT;
    if (convention === 'radio') return scale;
    if (convention === 'optical') return scale / (1 + beta) ** 2;
    return scale / ((1 + beta) * Math.sqrt((1 - beta) * (1 + beta)));
  },
  needsRest: true,
  convention,
});

const proportional = (factor: number): SpectralQuantity => ({
  frequency: (value) => value * factor,
  value: (hz) => hz / factor,
  slope: () => factor,
  needsRest: false,
  convention: 'radio',
});

export const SPECTRAL_QUANTITIES: Record<SpectralType, SpectralQuantity> = {
  FREQ: proportional(1),
  ENER: proportional(1 / PLANCK),
  WAVN: proportional(SPEED_OF_LIGHT),
  VRAD: velocity('radio', 1),
  WAVE: {
    frequency: (value) => SPEED_OF_LIGHT / value,
    value: (hz) => SPEED_OF_LIGHT / hz,
    slope: (value) => -SPEED_OF_LIGHT / (value * value),
    needsRest: false,
    convention: 'optical',
  },
  VOPT: velocity('optical', 1),
  ZOPT: velocity('optical', SPEED_OF_LIGHT),
  VELO: velocity('relativistic', 1),
  BETA: velocity('relativistic', SPEED_OF_LIGHT),
};
