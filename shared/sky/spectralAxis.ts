import { SPECTRAL_QUANTITIES, SPEED_OF_LIGHT, velocityOfFrequency, frequencyOfVelocity } from './doppler';
import { WcsError, type SpectralSpec, type SpectralType } from './wcsSpec';

export interface SpectralAxis {
  /** km/s, in the convention of the axis (unless spec.convention says otherwise: frequencies radio, wavelengths optical). */
  velocityOf(channel: number): number;
  channelOf(velocity: number): number;
  frequencyHzOf(channel: number): number | null;
  /** The axis' own quantity in SI. */
  valueOf(channel: number): number;
  velocityStep: number;
}

/** The quantity that a non-linear axis is linear in (the third letter of an algorithm code such as F2V). */
const LINEAR_IN: Record<'F' | 'W' | 'V', SpectralType> = { F: 'FREQ', W: 'WAVE', V: 'BETA' };

/** Velocities that are the axis' own value times a factor to m/s: they need no rest frequency. */
const OWN_VELOCITY: Partial<Record<SpectralType, number>> = {
  VRAD: 1,
  VOPT: 1,
  VELO: 1,
  ZOPT: SPEED_OF_LIGHT,
  BETA: SPEED_OF_LIGHT,
};

/**
 * The spectral axis of a cube (Greisen et al. 2006, A&A 446, 747).
 *
 * @throws WcsError when the step is zero, or a rest frequency is needed and there is none
 */
export function spectralAxis(spec: SpectralSpec): SpectralAxis {
  if (spec.step === 0)
    throw new WcsError('CDELT', 'All channels have the same spectral value: the step is zero.');
  const quantity = SPECTRAL_QUANTITIES[spec.type];
  const rest = spec.restFrequencyHz;
  const unit = OWN_VELOCITY[spec.type];
  if (rest === null && (unit === undefined || (spec.linearIn !== null && spec.linearIn !== 'LOG'))) {
    throw new WcsError(
      'RESTFRQ',
      `A rest frequency is needed to read velocities from an axis of type ${spec.type}.`,
    );
  }
  const convention = spec.convention ?? quantity.convention;
  const { valueOf, channelAt } = coordinate(spec, rest ?? 1);
  requirePhysical(spec, (channel) => quantity.frequency(valueOf(channel), rest ?? 1));
  const velocityOf = (channel: number): number =>
    unit !== undefined
      ? (valueOf(channel) * unit) / 1000
      : velocityOfFrequency(convention, quantity.frequency(valueOf(channel), rest!), rest!) / 1000;
  const channelOf = (v: number): number =>
    channelAt(
      unit !== undefined
        ? (v * 1000) / unit
        : quantity.value(frequencyOfVelocity(convention, v * 1000, rest!), rest!),
    );
  const frequencyHzOf = (channel: number): number | null =>
    rest === null && quantity.needsRest ? null : quantity.frequency(valueOf(channel), rest ?? 1);
  return {
    velocityOf,
    channelOf,
    frequencyHzOf,
    valueOf,
    velocityStep: medianStep(velocityOf, spec.channels),
  };
}

/** No channel may lie at or below frequency zero, or beyond the speed of light. */
function requirePhysical(spec: SpectralSpec, frequencyOf: (channel: number) => number): void {
  for (const channel of [0, spec.channels - 1]) {
    const hz = frequencyOf(channel);
    if (!(hz > 0 && Number.isFinite(hz))) {
      throw new WcsError(
        'SPECTRAL',
        `Channel ${channel} would lie at no real frequency: check the reference value and the step.`,
      );
    }
  }
}

/** Value of a channel and channel of a value, for axes linear in their own quantity, its logarithm, or another one. */
function coordinate(spec: SpectralSpec, rest: number) {
  const { type, linearIn, reference, step, referenceChannel } = spec;
  if (linearIn === null) {
    return {
      valueOf: (channel: number) => reference + step * (channel - referenceChannel),
      channelAt: (value: number) => referenceChannel + (value - reference) / step,
    };
  }
  if (linearIn === 'LOG') {
    return {
      valueOf: (channel: number) => reference * Math.exp((step * (channel - referenceChannel)) / reference),
      channelAt: (value: number) => referenceChannel + (Math.log(value / reference) * reference) / step,
    };
  }
  const own = SPECTRAL_QUANTITIES[type];
  const linear = SPECTRAL_QUANTITIES[LINEAR_IN[linearIn]];
  const start = linear.value(own.frequency(reference, rest), rest);
  const rate = (step * own.slope(reference, rest)) / linear.slope(start, rest); // chain rule at the reference
  return {
    valueOf: (channel: number) =>
      own.value(linear.frequency(start + rate * (channel - referenceChannel), rest), rest),
    channelAt: (value: number) =>
      referenceChannel + (linear.value(own.frequency(value, rest), rest) - start) / rate,
  };
}

function medianStep(velocityOf: (channel: number) => number, channels: number): number {
  const steps = [];
  for (let k = 1; k < channels; k++) steps.push(Math.abs(velocityOf(k) - velocityOf(k - 1)));
  steps.sort((a, b) => a - b);
  const middle = steps.length >> 1;
  if (steps.length === 0) return Math.abs(velocityOf(1) - velocityOf(0));
  return steps.length % 2 === 1 ? steps[middle]! : (steps[middle - 1]! + steps[middle]!) / 2;
}
