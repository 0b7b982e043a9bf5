import type { Header } from './header';
import { brightnessUnit } from './units';

export interface Beam {
  majorDeg: number;
  minorDeg: number;
  /** From north through east. */
  positionAngleDeg: number;
  source: 'keywords' | 'history' | 'person';
}

const NUMBER = '([-+0-9.eEdD]+)';
const OLD_BEAM = new RegExp(`BMAJ=\\s*${NUMBER}\\s+BMIN=\\s*${NUMBER}\\s+BPA=\\s*${NUMBER}`, 'i');

/** The beam from BMAJ, BMIN, BPA (degrees), or from a HISTORY line that holds them; null when there is none. */
export function beamOf(header: Header): Beam | null {
  const major = header.optionalNumber('BMAJ');
  if (major !== null && major > 0) {
    return {
      majorDeg: major,
      minorDeg: header.optionalNumber('BMIN') ?? major,
      positionAngleDeg: header.optionalNumber('BPA') ?? 0,
      source: 'keywords',
    };
  }
  for (const line of header.history.toReversed()) {
    const found = OLD_BEAM.exec(line);
    if (!found) continue;
    const [majorDeg, minorDeg, positionAngleDeg] = found.slice(1).map((s) => Number(s.replace(/d/i, 'E')));
    if (majorDeg! > 0 && minorDeg! > 0 && Number.isFinite(positionAngleDeg)) {
      return {
        majorDeg: majorDeg!,
        minorDeg: minorDeg!,
        positionAngleDeg: positionAngleDeg!,
        source: 'history',
      };
    }
  }
  return null;
}

/** The brightness unit as understood, with a caution where it is missing, strange or of no use without a beam. */
export function unitOfBrightness(header: Header, beam: Beam | null, cautions: string[]): string | null {
  const bunit = header.text('BUNIT');
  if (bunit === null) {
    cautions.push('BUNIT is missing: the unit of brightness is not known.');
    return null;
  }
  const read = brightnessUnit(bunit);
  if (!read) {
    cautions.push(
      `BUNIT = '${bunit}' is not understood as a brightness: column densities and masses cannot be derived.`,
    );
    return null;
  }
  if (!read.exact) cautions.push(`BUNIT = '${bunit}' in capitals is read as ${read.unit}.`);
  if (read.unit.endsWith('/beam') && !beam) {
    cautions.push(
      `BUNIT is ${read.unit} and the header gives no beam (BMAJ): brightness cannot be turned into K.`,
    );
  }
  return read.unit;
}
