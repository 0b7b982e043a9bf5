import { DEGREE, lonLatOf, unitVector, wrap360, type Vector } from './greatCircle';
import { apply, transpose } from './matrix3';
import { nativeToCelestial } from './nativeRotation';
import { PROJECTIONS } from './projections';
import { WcsError, type SkySpec } from './wcsSpec';

/** Projection plane (degrees) to celestial unit vectors and back, in the header's frame. */
export interface PlaneToSky {
  toSky(X: number, Y: number): Vector | null;
  /** Every place on the plane where the map shows the direction: several where it goes round more than once. */
  toPlane(v: Vector): { X: number; Y: number }[];
}

/**
 * The map of a cube: projection and the turn of its native sphere.
 *
 * @throws WcsError when the projection is not known or its parameters make no map
 */
export function planeToSky(spec: SkySpec): PlaneToSky {
  const make = PROJECTIONS[spec.projection];
  if (!make) {
    const known = Object.keys(PROJECTIONS).join(', ');
    throw new WcsError(
      'CTYPE',
      `The projection ${spec.projection} is not among those that can be read: ${known}.`,
    );
  }
  if (!(Math.abs(spec.reference[1]) <= 90)) {
    throw new WcsError('CRVAL', `The reference latitude is ${spec.reference[1]} degrees.`);
  }
  if (spec.projection === 'GLS') return unturned(spec);
  const projection = make(spec.parameters, spec.reference[1]);
  const turn = nativeToCelestial(spec.reference, projection.referenceLatitude, spec.lonPole, spec.latPole);
  const back = transpose(turn);
  const turns = spec.projection === 'CAR' ? [0, -1, 1, -2, 2] : [0];
  return {
    toSky(X, Y) {
      const native = projection.inverse(X, Y);
      return native && apply(turn, unitVector({ lon: native[0], lat: native[1] }));
    },
    toPlane(v) {
      const { lon, lat } = lonLatOf(apply(back, v));
      const phi = lon > 180 ? lon - 360 : lon;
      const plane = projection.forward(phi, lat);
      return plane === null ? [] : turns.map((n) => ({ X: plane[0] + 360 * n, Y: plane[1] }));
    },
  };
}

/**
 * Old GLS: latitude is CRVAL + Y and longitude CRVAL + X / cos latitude, whatever the reference latitude; the sphere
 * is not turned (Calabretta & Greisen 2002, section 6.1.4).
 */
function unturned({ reference: [lon0, lat0] }: SkySpec): PlaneToSky {
  return {
    toSky(X, Y) {
      const lat = lat0 + Y;
      if (Math.abs(lat) > 90) return null;
      const phi = X === 0 ? 0 : X / Math.cos(lat * DEGREE);
      return Math.abs(phi) <= 180 ? unitVector({ lon: lon0 + phi, lat }) : null;
    },
    toPlane(v) {
      const { lon, lat } = lonLatOf(v);
      const d = wrap360(lon - lon0);
      return [{ X: (d > 180 ? d - 360 : d) * Math.cos(lat * DEGREE), Y: lat - lat0 }];
    },
  };
}
