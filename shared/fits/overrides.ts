import { Problem } from '@/shared/contract/problem';
import { buildWcs } from '@/shared/sky/wcs';
import {
  WcsError,
  type SpectralSpec,
  type SpectralType,
  type VelocityConvention,
} from '@/shared/sky/wcsSpec';
import { SPEED_OF_LIGHT } from '@/shared/sky/doppler';
import type { Beam } from './brightness';
import { spectralSummary, type CubeHead } from './cubeHead';
import { brightnessUnit } from './units';

/** What a person says of a cube where its header does not, or says it wrong; null and absent mean the same. */
export interface Overrides {
  /** K, mK, Jy/beam or mJy/beam, in any usual spelling. */
  unit?: string | null;
  restFrequencyHz?: number | null;
  /** Degrees; angle from north through east. */
  beam?: { major: number; minor: number; angle: number } | null;
  convention?: VelocityConvention | null;
  /** A value of SPECSYS. */
  velocityFrame?: string | null;
}

/** Values of SPECSYS (Greisen et al. 2006, table 5), with HELIOCEN, which many files write for BARYCENT. */
export const VELOCITY_FRAMES = [
  'TOPOCENT',
  'GEOCENTR',
  'BARYCENT',
  'HELIOCEN',
  'LSRK',
  'LSRD',
  'GALACTOC',
  'LOCALGRP',
  'CMBDIPOL',
  'SOURCE',
] as const;

/** The cautions that an override answers. */
const ANSWERED: Record<keyof Overrides, RegExp[]> = {
  unit: [/^BUNIT/],
  restFrequencyHz: [/no rest frequency/],
  beam: [/no beam/],
  convention: [/without VELREF/],
  velocityFrame: [/no SPECSYS/, /\(TOPOCENT\)/],
};

const TYPE_OF: Record<VelocityConvention, SpectralType> = {
  radio: 'VRAD',
  optical: 'VOPT',
  relativistic: 'VELO',
};
/** Factor to m/s of the axes that count in velocity, or in a share of the speed of light. */
const METRES_PER_SECOND: Partial<Record<SpectralType, number>> = {
  VRAD: 1,
  VOPT: 1,
  VELO: 1,
  ZOPT: SPEED_OF_LIGHT,
  BETA: SPEED_OF_LIGHT,
};

/**
 * The cube as a person says it is to be understood: unit, rest frequency, beam, velocity convention and frame in
 * place of the header's, with all that follows from them (velocities, world coordinates, cautions).
 *
 * A convention tells of an axis in frequency or wavelength which velocity is derived from it; of an axis in
 * velocity, which velocity its numbers are: they stay, and their frequencies change. The frame is a label: numbers
 * are never moved from one frame to another.
 *
 * @param head as the header has it; not changed
 * @throws Problem invalid-input, naming the field
 */
export function applyOverrides(head: CubeHead, overrides: Overrides): CubeHead {
  const given = validated(overrides);
  const spectral = respecified(head.wcs.spectral, given);
  const wcs = { ...head.wcs, spectral };
  const velocities = velocitiesOf({ ...head, wcs }, given);
  const answered = (Object.keys(given) as (keyof Overrides)[]).flatMap((name) => ANSWERED[name]);
  const beam = given.beam ?? head.beam;
  return {
    ...head,
    unit: given.unit ?? head.unit,
    beam,
    spectral: {
      ctype: head.spectral.ctype,
      ...spectralSummary(spectral, velocities),
    },
    wcs,
    cautions: [
      ...head.cautions.filter((caution) => !answered.some((pattern) => pattern.test(caution))),
      ...beamless(head, given.unit, beam),
      ...said(head, given),
    ],
  };
}

type Given = Omit<Overrides, 'beam'> & { beam?: Beam };

/** The overrides that say something, checked. */
function validated(overrides: Overrides): Given {
  const given: Given = {};
  const { unit, restFrequencyHz, beam, convention, velocityFrame } = overrides;
  if (present(unit)) {
    const read = brightnessUnit(unit);
    if (!read) throw wrong('unit', `"${unit}" is none of K, mK, Jy/beam, mJy/beam.`);
    given.unit = read.unit;
  }
  if (present(restFrequencyHz)) {
    if (!(restFrequencyHz >= 1e6 && restFrequencyHz <= 1e15))
      throw wrong(
        'restFrequencyHz',
        `A rest frequency lies between 1e6 and 1e15 Hz, not at ${restFrequencyHz}.`,
      );
    given.restFrequencyHz = restFrequencyHz;
  }
  if (present(beam)) given.beam = checkedBeam(beam);
  if (present(convention)) {
    if (!Object.hasOwn(TYPE_OF, convention))
      throw wrong('convention', `"${convention as string}" is none of radio, optical, relativistic.`);
    given.convention = convention;
  }
  if (present(velocityFrame)) {
    const frame = velocityFrame.trim().toUpperCase();
    if (!(VELOCITY_FRAMES as readonly string[]).includes(frame))
      throw wrong('velocityFrame', `"${velocityFrame}" is none of ${VELOCITY_FRAMES.join(', ')}.`);
    given.velocityFrame = frame;
  }
  return given;
}

function checkedBeam({ major, minor, angle }: NonNullable<Overrides['beam']>): Beam {
  if (!(major > 0 && major <= 90))
    throw wrong('beam.major', 'The major axis of a beam is more than 0 and at most 90 degrees.');
  if (!(minor > 0 && minor <= major))
    throw wrong('beam.minor', 'The minor axis of a beam is more than 0 and not longer than the major axis.');
  if (!(Math.abs(angle) <= 360))
    throw wrong('beam.angle', 'The position angle lies between -360 and 360 degrees.');
  return { majorDeg: major, minorDeg: minor, positionAngleDeg: angle, source: 'person' };
}

function respecified(spec: SpectralSpec, given: Given): SpectralSpec {
  const changed = { ...spec };
  if (given.restFrequencyHz) {
    changed.restFrequencyHz = given.restFrequencyHz;
    changed.restAssumed = false;
  }
  if (given.velocityFrame) changed.frame = given.velocityFrame;
  if (given.convention) {
    const factor = METRES_PER_SECOND[spec.type];
    const type = TYPE_OF[given.convention];
    changed.convention = given.convention;
    // A redshift is an optical velocity already, and BETA a relativistic one: they keep their type then.
    const already = (spec.type === 'ZOPT' && type === 'VOPT') || (spec.type === 'BETA' && type === 'VELO');
    if (factor !== undefined && !already)
      Object.assign(changed, { type, reference: spec.reference * factor, step: spec.step * factor });
  }
  return changed;
}

function velocitiesOf(head: CubeHead, given: Given): [number, number] {
  try {
    const { velocityOf } = buildWcs(head.wcs);
    return [velocityOf(0), velocityOf(head.shape.channels - 1)];
  } catch (error) {
    if (!(error instanceof WcsError)) throw error;
    throw wrong(given.convention ? 'convention' : 'restFrequencyHz', error.message);
  }
}

/** The caution about a brightness per beam without a beam, which a new unit may bring. */
function beamless(head: CubeHead, unit: string | null | undefined, beam: Beam | null): string[] {
  if (!unit?.endsWith('/beam') || beam) return [];
  return [`The unit is ${unit} and no beam is known: brightness cannot be turned into K.`];
}

function said(head: CubeHead, given: Given): string[] {
  const { spectral } = head;
  const sentence = (what: string, now: string, before: string | number | null) =>
    `${what} ${now} was given by hand; the header ${before === null ? 'says nothing of it' : `says ${before}`}.`;
  const all: string[] = [];
  if (given.unit) all.push(sentence('The unit', given.unit, head.bunit));
  if (given.restFrequencyHz)
    all.push(sentence('The rest frequency', `${given.restFrequencyHz} Hz`, spectral.restFrequencyHz));
  if (given.beam)
    all.push(sentence('The beam', beamText(given.beam), head.beam === null ? null : beamText(head.beam)));
  if (given.convention) all.push(sentence('The velocity convention', given.convention, spectral.convention));
  if (given.velocityFrame) all.push(sentence('The velocity frame', given.velocityFrame, spectral.frame));
  return all;
}

const beamText = (beam: Beam) => `${beam.majorDeg} × ${beam.minorDeg} deg at ${beam.positionAngleDeg} deg`;
const present = <T>(value: T | null | undefined): value is T => value !== null && value !== undefined;
const wrong = (field: string, detail: string) => new Problem('invalid-input', detail, { field });
