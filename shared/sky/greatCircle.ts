/**
 * Great-circle geometry on the celestial sphere, in whatever frame the longitudes and latitudes are given.
 *
 * Angles in and out are degrees. Position angles run from north through east (towards larger longitude), 0 to 360.
 * Nothing here takes an arccosine or arcsine of a number near 1, so tiny and antipodal separations keep their digits.
 */
export interface LonLat {
  lon: number;
  lat: number;
}

/** A direction as Cartesian coordinates: x to (0, 0), y to (90, 0), z to the north pole. */
export type Vector = readonly [number, number, number];

export const DEGREE = Math.PI / 180;

/** The unit vector of a longitude and a latitude. */
export function unitVector({ lon, lat }: LonLat): Vector {
  const l = lon * DEGREE;
  const b = lat * DEGREE;
  return [Math.cos(b) * Math.cos(l), Math.cos(b) * Math.sin(l), Math.sin(b)];
}

/** Longitude in [0, 360) and latitude of a vector of any length but zero; longitude 0 at the poles. */
export function lonLatOf([x, y, z]: Vector): LonLat {
  const lon = Math.atan2(y, x) / DEGREE;
  return { lon: lon < 0 ? wrap360(lon) : lon, lat: Math.atan2(z, Math.hypot(x, y)) / DEGREE };
}

/**
 * Unit vectors at n towards larger longitude and towards the north pole. At a pole, where neither is defined, the
 * directions of the meridian of longitude 0 are taken, so that the pair is orthonormal everywhere.
 */
export function eastNorth([x, y, z]: Vector): { east: Vector; north: Vector } {
  const h = Math.hypot(x, y);
  const [c, s] = h < 1e-12 ? [1, 0] : [x / h, y / h];
  return { east: [-s, c, 0], north: [-z * c, -z * s, x * c + y * s] };
}

/** Angle between two points, 0 to 180. Errors: 1e-13 deg, and 1e-12 of the separation where it is small. */
export function separation(a: LonLat, b: LonLat): number {
  const { east, north, along } = components(a, b);
  return Math.atan2(Math.hypot(east, north), along) / DEGREE;
}

/** Direction of b seen from a, north through east, 0 to 360; 0 where the points coincide. */
export function positionAngle(a: LonLat, b: LonLat): number {
  const { east, north } = components(a, b);
  return wrap360(Math.atan2(east, north) / DEGREE);
}

/** The point at an angular distance from `from`, in the direction of a position angle. */
export function destination(from: LonLat, angle: number, distance: number): LonLat {
  const n = unitVector(from);
  const { east, north } = eastNorth(n);
  const d = distance * DEGREE;
  const e = Math.sin(d) * Math.sin(angle * DEGREE);
  const m = Math.sin(d) * Math.cos(angle * DEGREE);
  const c = Math.cos(d);
  return lonLatOf([
    c * n[0] + e * east[0] + m * north[0],
    c * n[1] + e * east[1] + m * north[1],
    c * n[2] + e * east[2] + m * north[2],
  ]);
}

/** An angle brought into [0, 360). */
export function wrap360(degrees: number): number {
  const r = degrees % 360;
  return r < 0 ? (r + 360) % 360 : r;
}

/**
 * Components of b along east, north and the line of sight at a. The north one is written with the difference of the
 * latitudes and half the difference of the longitudes, because the textbook form subtracts two nearly equal products.
 */
function components(a: LonLat, b: LonLat): { east: number; north: number; along: number } {
  const turned = (b.lon - a.lon) % 360; // exact, and so is taking a full turn off: a pair across 0 keeps its digits
  const dLon = (turned > 180 ? turned - 360 : turned < -180 ? turned + 360 : turned) * DEGREE;
  const dLat = (b.lat - a.lat) * DEGREE;
  const [latA, latB] = [a.lat * DEGREE, b.lat * DEGREE];
  const half = 2 * Math.sin(dLon / 2) ** 2;
  return {
    east: Math.cos(latB) * Math.sin(dLon),
    north: Math.sin(dLat) + Math.sin(latA) * Math.cos(latB) * half,
    along: Math.cos(dLat) - Math.cos(latA) * Math.cos(latB) * half,
  };
}
