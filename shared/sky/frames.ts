import { lonLatOf, unitVector, type LonLat, type Vector } from './greatCircle';
import { apply, axesTurned, product, transpose, type Matrix3 } from './matrix3';
import { aberrationETerms, besselianPrecession, precessionFromJ2000 } from './precession';
import { WcsError, type SkyFrame } from './wcsSpec';

/** Turns unit vectors of a frame into galactic ones, and back. */
export interface FrameToGalactic {
  toGalactic(v: Vector): Vector;
  fromGalactic(v: Vector): Vector;
}

/** Pole, and position angle of the zero of longitude, of the galactic system in an equatorial frame, degrees. */
const galacticAxes = (poleLon: number, poleLat: number, angle: number): Matrix3 =>
  product(axesTurned('z', 180 - angle), axesTurned('y', 90 - poleLat), axesTurned('z', poleLon));

/** FK5 J2000: Reid & Brunthaler 2004, ApJ 616, 872, appendix. */
const FK5_TO_GALACTIC = galacticAxes(192.8594812065348, 27.12825118085622, 122.9319185680026);
/** FK4 B1950, E-terms removed: the IAU definition of 1958. */
const FK4_TO_GALACTIC = galacticAxes(192.25, 27.4, 123);
/** ICRS to FK5 J2000: USNO Circular 179, section 3.5. */
const ICRS_TO_FK5 = product(
  axesTurned('x', 19.9 / 3_600_000),
  axesTurned('y', 9.1 / 3_600_000),
  axesTurned('z', -22.9 / 3_600_000),
);

/**
 * The way from a frame to galactic coordinates. ICRS goes through FK5 J2000; FK4 has its E-terms of aberration taken
 * out first and is not brought to FK5. (Applying the Hipparcos matrix to ICRS differs by up to 25 mas.)
 *
 * @param equinox Julian year for fk5 (default 2000), Besselian year for fk4 (default 1950); else ignored
 */
export function frameToGalactic(frame: SkyFrame, equinox: number | null): FrameToGalactic {
  switch (frame) {
    case 'galactic':
      return { toGalactic: (v) => v, fromGalactic: (v) => v };
    case 'icrs':
      return turning(product(FK5_TO_GALACTIC, ICRS_TO_FK5));
    case 'fk5': {
      const year = equinox ?? 2000;
      return turning(
        year === 2000 ? FK5_TO_GALACTIC : product(FK5_TO_GALACTIC, transpose(precessionFromJ2000(year))),
      );
    }
    case 'fk4':
    case 'fk4-no-e': {
      const year = equinox ?? 1950;
      const { toGalactic, fromGalactic } = turning(
        year === 1950 ? FK4_TO_GALACTIC : product(FK4_TO_GALACTIC, besselianPrecession(year, 1950)),
      );
      if (frame === 'fk4-no-e') return { toGalactic, fromGalactic };
      const e = aberrationETerms(year);
      return {
        toGalactic: (v) => toGalactic(withoutETerms(v, e)),
        fromGalactic: (v) => withETerms(fromGalactic(v), e),
      };
    }
    default:
      throw new WcsError('RADESYS', `The frame ${String(frame)} cannot be read.`);
  }
}

/** Galactic l and b of a position in a frame, degrees. */
export function toGalactic(
  position: LonLat,
  frame: SkyFrame,
  equinox: number | null = null,
): { l: number; b: number } {
  const { lon, lat } = lonLatOf(frameToGalactic(frame, equinox).toGalactic(unitVector(position)));
  return { l: lon, b: lat };
}

/** Position in a frame of galactic l and b, degrees. */
export function fromGalactic(l: number, b: number, frame: SkyFrame, equinox: number | null = null): LonLat {
  return lonLatOf(frameToGalactic(frame, equinox).fromGalactic(unitVector({ lon: l, lat: b })));
}

function turning(m: Matrix3): FrameToGalactic {
  const back = transpose(m);
  return { toGalactic: (v) => apply(m, v), fromGalactic: (v) => apply(back, v) };
}

const dot = (a: Vector, b: Vector) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];

function withoutETerms(v: Vector, e: Vector): Vector {
  const along = dot(e, v);
  return [v[0] - e[0] + along * v[0], v[1] - e[1] + along * v[1], v[2] - e[2] + along * v[2]];
}

/** The inverse, by iteration: it settles to the last digit in three rounds, since the terms are 1e-6. */
function withETerms(v: Vector, e: Vector): Vector {
  let out = v;
  for (let i = 0; i < 6; i++) {
    const scale = 1 + dot(e, out);
    out = [(e[0] + v[0]) / scale, (e[1] + v[1]) / scale, (e[2] + v[2]) / scale];
  }
  return out;
}
