import { DEGREE } from './greatCircle';
import { axesTurned, product, transpose, type Matrix3 } from './matrix3';

/**
 * Precession of the mean equator and equinox from one Besselian epoch to another, in the FK4 system: Newcomb's
 * angles (Explanatory Supplement, Seidelmann 1992, table 3.214).
 *
 * @returns matrix that turns unit vectors of equinox `from` into those of equinox `to`
 */
export function besselianPrecession(from: number, to: number): Matrix3 {
  const t1 = (from - 1850) / 1000;
  const dt = (to - from) / 1000;
  const linear = 23035.545 + 139.72 * t1 + 0.06 * t1 * t1;
  const zeta = dt * (linear + dt * (30.24 - 0.27 * t1 + dt * 17.995));
  const z = dt * (linear + dt * (109.48 + 0.39 * t1 + dt * 18.325));
  const theta = dt * (20051.12 - 85.29 * t1 - 0.37 * t1 * t1 + dt * (-42.65 - 0.37 * t1 - dt * 41.8));
  return product(axesTurned('z', -z / 3600), axesTurned('y', theta / 3600), axesTurned('z', -zeta / 3600));
}

/**
 * Precession from J2000 to another Julian epoch: IAU 2006, Fukushima-Williams angles (Capitaine et al. 2003,
 * A&A 412, 567; Hilton et al. 2006, Celest. Mech. Dyn. Astron. 94, 351). Frame bias is not part of it.
 *
 * @returns matrix that turns unit vectors of equinox J2000 into those of equinox `year`
 */
export function precessionFromJ2000(year: number): Matrix3 {
  return product(biasPrecession((year - 2000) / 100), transpose(biasPrecession(0)));
}

/** Bias and precession together, from the celestial reference system, t Julian centuries after J2000. */
function biasPrecession(t: number): Matrix3 {
  const gamma = series(t, -0.052928, 10.556378, 0.4932044, -0.00031238, -0.000002788, 0.000000026);
  const phi = series(t, 84381.412819, -46.811016, 0.0511268, 0.00053289, -0.00000044, -0.0000000176);
  const psi = series(t, -0.041775, 5038.481484, 1.5584175, -0.00018522, -0.000026452, -0.0000000148);
  const epsilon = series(t, 84381.406, -46.836769, -0.0001831, 0.0020034, -0.000000576, -0.0000000434);
  return product(
    axesTurned('x', -epsilon / 3600),
    axesTurned('z', -psi / 3600),
    axesTurned('x', phi / 3600),
    axesTurned('z', gamma / 3600),
  );
}

function series(t: number, ...coefficients: number[]): number {
  return coefficients.reduceRight((sum, c) => sum * t + c, 0);
}

/**
 * The E-terms of aberration, which FK4 positions carry: the part of annual aberration that comes from the
 * eccentricity of the Earth's orbit, as a vector of length about 1.7e-6 (Seidelmann 1992, section 3.5).
 *
 * @param equinox Besselian year of the position
 */
export function aberrationETerms(equinox: number): [number, number, number] {
  const k = 0.0056932 * DEGREE; // constant of aberration
  const julianDate = 2415020.31352 + (equinox - 1900) * 365.242198781;
  const t = (julianDate - 2433282.42345905) / 36525;
  const e = series(t, 0.01673011, -0.00004193, -0.000000126);
  const perigee = (series(t, 1015489.951, 6190.67, 1.65, 0.012) / 3600) * DEGREE;
  const t2000 = (julianDate - 2451545) / 36525;
  const obliquity = (series(t2000, 84381.448, -46.815, -0.00059, 0.001813) / 3600) * DEGREE;
  return [
    e * k * Math.sin(perigee),
    -e * k * Math.cos(perigee) * Math.cos(obliquity),
    -e * k * Math.cos(perigee) * Math.sin(obliquity),
  ];
}
