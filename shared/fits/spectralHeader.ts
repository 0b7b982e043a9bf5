import { Problem } from '@/shared/contract/problem';
import { HYDROGEN_HZ, SPECTRAL_QUANTITIES } from '@/shared/sky/doppler';
import type { SpectralSpec, SpectralType, VelocityConvention } from '@/shared/sky/wcsSpec';
import type { CubeAxes } from './cubeAxes';
import type { Header } from './header';
import type { LinearStep } from './linearStep';
import { frequencyOfWavelength, spectralUnit } from './units';

interface AxisType {
  type: SpectralType;
  linearIn: SpectralSpec['linearIn'];
  convention: VelocityConvention | null;
  frame: string | null;
}

/** Frames of VELREF (modulo 256) and of the old axis names. */
const VELREF_FRAMES = ['LSRK', 'BARYCENT', 'TOPOCENT', 'LSRD', 'GEOCENTR', 'SOURCE', 'GALACTOC'];
const OLD_FRAMES: Record<string, string> = {
  LSR: 'LSRK',
  LSRK: 'LSRK',
  LSD: 'LSRD',
  HEL: 'BARYCENT',
  OBS: 'TOPOCENT',
  TOP: 'TOPOCENT',
  GEO: 'GEOCENTR',
};
/** The quantity an algorithm code starts from must be one of these, and its result must fit the axis. */
const ALGORITHM = /^([FWV])2([FWV])$/;
const RESULT: Record<SpectralType, string> = {
  FREQ: 'F',
  ENER: 'F',
  WAVN: 'F',
  VRAD: 'F',
  WAVE: 'W',
  VOPT: 'W',
  ZOPT: 'W',
  VELO: 'V',
  BETA: 'V',
};

/**
 * The spectral part of the world coordinates a header describes, in SI.
 *
 * @param cautions sentences are added for what was doubtful
 * @throws Problem fits-card
 */
export function spectralOfHeader(
  header: Header,
  axes: CubeAxes,
  step: LinearStep,
  cautions: string[],
): SpectralSpec {
  const n = axes.spectral + 1;
  const { type, linearIn, convention, frame } = axisType(header, axes.spectralType, n);
  const unit = unitOf(header, type, n, cautions);
  if (!header.has(`CRVAL${n}`)) cautions.push(`CRVAL${n} is missing; it is 0 by the standard.`);
  const specsys = header.text('SPECSYS')?.toUpperCase() ?? frame;
  if (specsys === null)
    cautions.push('The header does not say what the velocities are relative to (no SPECSYS).');
  if (specsys === 'TOPOCENT') {
    cautions.push(
      'The velocities are relative to the telescope (TOPOCENT), not to the local standard of rest.',
    );
  }
  if (convention === null) {
    cautions.push(
      `${axes.spectralType} without VELREF does not say whether velocities are radio or optical; they are taken as they stand.`,
    );
  }
  const spec: SpectralSpec = {
    type,
    linearIn,
    referenceChannel: step.spectral.referenceChannel,
    reference: (header.number(`CRVAL${n}`) ?? 0) * unit + 0, // never -0, which JSON loses
    step: step.spectral.step * unit + 0,
    channels: axes.naxis[axes.spectral]!,
    ...restOf(header, type, linearIn, cautions),
    convention,
    frame: specsys,
  };
  if (!header.has(`CUNIT${n}`)) doubtUnit(spec, n, cautions);
  return spec;
}

/** Type, algorithm and frame from CTYPE, old names with VELREF included (Greisen et al. 2006, section 2.2). */
function axisType(header: Header, ctype: string, n: number): AxisType {
  const card = `CTYPE${n}`;
  const base = ctype.slice(0, 4);
  const suffix = ctype.slice(5).trim();
  const velref = header.integer('VELREF');
  const ivf = velref === null ? 0 : velref % 256;
  const oldFrame = VELREF_FRAMES[ivf - 1] ?? OLD_FRAMES[suffix] ?? null;
  if (base === 'FELO') return { type: 'VOPT', linearIn: 'F', convention: 'optical', frame: oldFrame };
  if (base === 'VELO' && (Object.hasOwn(OLD_FRAMES, suffix) || (suffix === '' && VELREF_FRAMES[ivf - 1]))) {
    const radio = velref !== null && velref > 256;
    return {
      type: radio ? 'VRAD' : 'VOPT',
      linearIn: null,
      convention: velref === null ? null : radio ? 'radio' : 'optical',
      frame: oldFrame,
    };
  }
  if (!Object.hasOwn(SPECTRAL_QUANTITIES, base)) {
    throw new Problem('fits-card', `${card} = '${ctype}': an axis of this kind cannot be read.`, { card });
  }
  const type = base as SpectralType;
  const convention = SPECTRAL_QUANTITIES[type].convention;
  if (suffix === '' || (base === 'FREQ' && Object.hasOwn(OLD_FRAMES, suffix))) {
    return { type, linearIn: null, convention, frame: oldFrame };
  }
  if (suffix === 'LOG') return { type, linearIn: 'LOG', convention, frame: null };
  const algorithm = ALGORITHM.exec(suffix);
  if (!algorithm || algorithm[2] !== RESULT[type]) {
    throw new Problem('fits-card', `${card} = '${ctype}': the algorithm ${suffix} cannot be read.`, { card });
  }
  const linearIn = algorithm[1] as 'F' | 'W' | 'V';
  return { type, linearIn, convention, frame: null };
}

function unitOf(header: Header, type: SpectralType, n: number, cautions: string[]): number {
  const card = `CUNIT${n}`;
  const unit = header.text(card);
  if (unit === null) return 1;
  const read = spectralUnit(type, unit);
  if (!read)
    throw new Problem('fits-card', `${card} = '${unit}' is no unit for an axis of type ${type}.`, { card });
  if (!read.exact) cautions.push(`${card} = '${unit}' is read without regard to capitals.`);
  return read.factor;
}

function restOf(
  header: Header,
  type: SpectralType,
  linearIn: SpectralSpec['linearIn'],
  cautions: string[],
): Pick<SpectralSpec, 'restFrequencyHz' | 'restAssumed'> {
  for (const keyword of ['RESTFRQ', 'RESTFREQ', 'RESTWAV']) {
    const value = header.number(keyword);
    if (value === null) continue;
    const restFrequencyHz = keyword === 'RESTWAV' ? frequencyOfWavelength(value) : value;
    if (restFrequencyHz >= 1 && restFrequencyHz <= 1e25) return { restFrequencyHz, restAssumed: false };
    cautions.push(`${keyword} = ${value} is no rest frequency and is ignored.`);
  }
  if (SPECTRAL_QUANTITIES[type].needsRest && (linearIn === null || linearIn === 'LOG')) {
    cautions.push(
      'The header gives no rest frequency: velocities are as they stand, frequencies are not known.',
    );
    return { restFrequencyHz: null, restAssumed: false };
  }
  cautions.push(
    'The header gives no rest frequency; the line of neutral hydrogen, 1420405751.768 Hz, is assumed.',
  );
  return { restFrequencyHz: HYDROGEN_HZ, restAssumed: true };
}

/** Without CUNIT a velocity is in m/s; a step of some m/s over a few hundred m/s hints at km/s. */
function doubtUnit(spec: SpectralSpec, n: number, cautions: string[]): void {
  if (spec.type !== 'VRAD' && spec.type !== 'VOPT' && spec.type !== 'VELO') return;
  const ends = [0, spec.channels - 1].map((k) => spec.reference + spec.step * (k - spec.referenceChannel));
  if (Math.abs(spec.step) < 25 && ends.every((v) => Math.abs(v) < 1500)) {
    cautions.push(
      `CUNIT${n} is missing, so the numbers are m/s by the standard; they look like km/s. Check the velocities.`,
    );
  }
}
