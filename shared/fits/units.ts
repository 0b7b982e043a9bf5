import { SPEED_OF_LIGHT } from '@/shared/sky/doppler';

/** A unit as a factor to the base unit; `exact` is false when only its letters, not their case, were right. */
export interface UnitReading {
  factor: number;
  exact: boolean;
}

const ANGLES: Record<string, number> = {
  deg: 1,
  degree: 1,
  degrees: 1,
  arcmin: 1 / 60,
  arcsec: 1 / 3600,
  mas: 1 / 3_600_000,
  rad: 180 / Math.PI,
};
const SPEEDS: Record<string, number> = { 'm/s': 1, 'km/s': 1e3, 'cm/s': 1e-2 };
const FREQUENCIES: Record<string, number> = { Hz: 1, kHz: 1e3, MHz: 1e6, GHz: 1e9 };
const LENGTHS: Record<string, number> = { m: 1, cm: 1e-2, mm: 1e-3, um: 1e-6, nm: 1e-9, Angstrom: 1e-10 };
const ENERGIES: Record<string, number> = { J: 1, eV: 1.602176634e-19, keV: 1.602176634e-16 };
const WAVENUMBERS: Record<string, number> = {
  'm-1': 1,
  '1/m': 1,
  '/m': 1,
  'cm-1': 100,
  '1/cm': 100,
  '/cm': 100,
};
const NUMBERS: Record<string, number> = { '': 1 };

/** Units by what a spectral axis counts in. */
const SPECTRAL: Record<string, Record<string, number>> = {
  FREQ: FREQUENCIES,
  ENER: ENERGIES,
  WAVN: WAVENUMBERS,
  WAVE: LENGTHS,
  VRAD: SPEEDS,
  VOPT: SPEEDS,
  VELO: SPEEDS,
  ZOPT: NUMBERS,
  BETA: NUMBERS,
};

/** Degrees in an angular unit; null when it is none. */
export const angleUnit = (unit: string): UnitReading | null => look(ANGLES, unit);

/** Factor to SI of the unit of a spectral axis; null when the unit does not belong to that type. */
export const spectralUnit = (type: string, unit: string): UnitReading | null =>
  look(SPECTRAL[type] ?? {}, unit);

/** Rest frequency in Hz of a rest wavelength in metres. */
export const frequencyOfWavelength = (metres: number): number => SPEED_OF_LIGHT / metres;

function look(table: Record<string, number>, unit: string): UnitReading | null {
  const tidy = tidied(unit);
  if (Object.hasOwn(table, tidy)) return { factor: table[tidy]!, exact: true };
  const name = Object.keys(table).find((known) => known.toLowerCase() === tidy.toLowerCase());
  return name === undefined ? null : { factor: table[name]!, exact: false };
}

/** One spelling for m/s, m s-1, m.s-1, m*s^-1, m s**-1. */
const tidied = (unit: string) =>
  unit.trim().replace(/[ .*^]+s(\^|\*\*)?\(?-1\)?$/i, (m) => (/S/.test(m) ? '/S' : '/s'));

/**
 * A brightness unit as understood, from BUNIT however it is written: 'K (Tb)', 'JY/BEAM', 'Jy beam-1' …
 *
 * @returns K, mK, Jy/beam or mJy/beam; null when it is none of them. `exact` is false where capitals hide whether
 *          milli or mega was meant (MK, MJY/BEAM) and milli was taken
 */
export function brightnessUnit(bunit: string): { unit: string; exact: boolean } | null {
  const bare = bunit
    .trim()
    .replace(/\s*\(.*\)$/, '')
    .replace(/\s+/g, ' ');
  const capitals = bare === bare.toUpperCase();
  const lower = bare.toLowerCase();
  if (/^(k|kelvin)( ?t[a-z*]*)?$/.test(lower)) return { unit: 'K', exact: true };
  if (/^mk( ?t[a-z*]*)?$/.test(lower))
    return bare.startsWith('M') && !capitals ? null : { unit: 'mK', exact: !capitals };
  const perBeam = /^(m?)jy ?([/ .*]) ?(beam|bm)(\^?-1|\*\*-1)?$/.exec(lower);
  if (!perBeam || (perBeam[2] === '/') === (perBeam[4] !== undefined)) return null;
  if (perBeam[1] === '') return { unit: 'Jy/beam', exact: true };
  return bare.startsWith('M') && !capitals ? null : { unit: 'mJy/beam', exact: !capitals };
}
