import { DEGREE } from './greatCircle';
import { axesTurned, product, type Matrix3 } from './matrix3';
import { WcsError } from './wcsSpec';

/**
 * The rotation from a projection's native sphere to the celestial sphere (Calabretta & Greisen 2002, section 2.4),
 * as a matrix that turns native unit vectors into celestial ones.
 *
 * @param reference         celestial longitude and latitude of the reference point, degrees (CRVAL)
 * @param referenceLatitude native latitude of that point, 0 or 90; its native longitude is 0
 * @param lonPole           LONPOLE, native longitude of the celestial pole; null: 0 where the reference latitude is
 *                          at least the native one, else 180
 * @param latPole           LATPOLE, which of two possible poles is meant; null: 90, the northerly one
 * @throws WcsError when no pole fits
 */
export function nativeToCelestial(
  reference: readonly [lon: number, lat: number],
  referenceLatitude: 0 | 90,
  lonPole: number | null,
  latPole: number | null,
): Matrix3 {
  const [lon0, lat0] = reference;
  const phiP = lonPole ?? (lat0 >= referenceLatitude ? 0 : 180);
  const deltaP = referenceLatitude === 90 ? lat0 : poleLatitude(lat0, phiP, latPole ?? 90);
  const alphaP = referenceLatitude === 90 ? lon0 : poleLongitude(lon0, lat0, phiP, deltaP);
  // Native pole at (alphaP, deltaP), celestial pole at native longitude phiP: three turns about z, y, z.
  return product(
    axesTurned('z', -alphaP),
    [
      [-Math.sin(deltaP * DEGREE), 0, Math.cos(deltaP * DEGREE)],
      [0, -1, 0],
      [Math.cos(deltaP * DEGREE), 0, Math.sin(deltaP * DEGREE)],
    ],
    axesTurned('z', phiP),
  );
}

/** Latitude of the native pole when the reference point lies on the native equator (equation 8). */
function poleLatitude(lat0: number, phiP: number, latPole: number): number {
  const cosPhi = Math.cos(phiP * DEGREE);
  const sinLat = Math.sin(lat0 * DEGREE);
  if (Math.abs(cosPhi) < 1e-13) {
    if (Math.abs(sinLat) > 1e-13)
      throw new WcsError('LONPOLE', `No pole fits LONPOLE = ${phiP} with CRVAL ${lat0}.`);
    return latPole;
  }
  const square = Math.cos((lat0 + phiP) * DEGREE) * Math.cos((lat0 - phiP) * DEGREE);
  if (square < -1e-12) throw new WcsError('LONPOLE', `No pole fits LONPOLE = ${phiP} with CRVAL ${lat0}.`);
  const u = cosPhi > 0 ? 0 : 180;
  const v = Math.atan2(Math.sqrt(Math.max(0, square)), sinLat) / DEGREE;
  const fits = [u + v, u - v]
    .map((d) => (d > 180 ? d - 360 : d))
    .filter((d) => Math.abs(d) <= 90 + 1e-12)
    .map((d) => Math.max(-90, Math.min(90, d)));
  if (fits.length === 0) throw new WcsError('LATPOLE', `No pole fits LONPOLE = ${phiP} with CRVAL ${lat0}.`);
  // Of two equally far from LATPOLE the second is taken, as wcslib does; the papers leave that open.
  return fits.reduce((best, d) => (Math.abs(d - latPole) <= Math.abs(best - latPole) ? d : best));
}

/** Longitude of the native pole when the reference point lies on the native equator (equations 9 and 10). */
function poleLongitude(lon0: number, lat0: number, phiP: number, deltaP: number): number {
  if (Math.abs(lat0) === 90) return lon0;
  if (deltaP === 90) return lon0 + phiP - 180;
  if (deltaP === -90) return lon0 - phiP;
  const sinPart = Math.sin(phiP * DEGREE) / Math.cos(lat0 * DEGREE);
  const cosPart =
    (-Math.sin(deltaP * DEGREE) * Math.sin(lat0 * DEGREE)) /
    (Math.cos(deltaP * DEGREE) * Math.cos(lat0 * DEGREE));
  return lon0 - Math.atan2(sinPart, cosPart) / DEGREE;
}
