import { Problem } from '@/shared/contract/problem';
import type { CubeAxes } from './cubeAxes';
import type { Header } from './header';

/** The plane that is read along an axis beyond the three of a cube. */
export interface StokesPlane {
  /** Which axis of the file, from 0. */
  axis: number;
  /** Which plane along it, from 0. */
  plane: number;
}

/** Parameters by the numbers that a Stokes axis counts in (FITS Standard 4.0, table 28). */
const NAMES: Record<number, string> = {
  1: 'I',
  2: 'Q',
  3: 'U',
  4: 'V',
  [-1]: 'RR',
  [-2]: 'LL',
  [-3]: 'RL',
  [-4]: 'LR',
  [-5]: 'XX',
  [-6]: 'YY',
  [-7]: 'XY',
  [-8]: 'YX',
};
/** A choice longer than this is no use to a person. */
const MAX_LISTED = 1000;

/**
 * The axis along which a plane can be chosen (the Stokes axis, else the first other axis longer than one), its planes
 * by name, and the plane that is read.
 *
 * @param wanted   plane from 0; undefined: the first, with a caution
 * @throws Problem invalid-input (field stokes) when there is no such plane
 */
export function stokesOf(
  header: Header,
  axes: CubeAxes,
  wanted: number | undefined,
  cautions: string[],
): { plane: StokesPlane | null; choices: { index: number; name: string }[] } {
  const { naxis, longitude, latitude, spectral } = axes;
  const others = naxis.flatMap((n, i) => (n > 1 && ![longitude, latitude, spectral].includes(i) ? [i] : []));
  const isStokes = (i: number) => /^STOKES/i.test(header.text(`CTYPE${i + 1}`) ?? '');
  const axis = others.find(isStokes) ?? others[0];
  const planes = axis === undefined ? 1 : naxis[axis]!;
  if (wanted !== undefined && !(Number.isInteger(wanted) && wanted >= 0 && wanted < planes)) {
    throw new Problem(
      'invalid-input',
      planes === 1
        ? 'The image has one plane only: leave stokes at 0.'
        : `The image has planes 0 to ${planes - 1} along axis ${axis! + 1}; there is no plane ${wanted}.`,
      { field: 'stokes' },
    );
  }
  for (const i of others) {
    if (i !== axis || wanted === undefined)
      cautions.push(`Axis ${i + 1} has ${naxis[i]} planes; the first is read.`);
  }
  if (axis === undefined) return { plane: null, choices: [] };
  const nameOf = isStokes(axis) ? stokesName(header, axis) : (k: number) => `plane ${k + 1}`;
  const choices = Array.from({ length: Math.min(planes, MAX_LISTED) }, (_, index) => ({
    index,
    name: nameOf(index),
  }));
  return { plane: { axis, plane: wanted ?? 0 }, choices };
}

function stokesName(header: Header, axis: number): (k: number) => string {
  const number = (keyword: string, fallback: number) => header.optionalNumber(keyword) ?? fallback;
  const [value, step, pixel] = [
    number(`CRVAL${axis + 1}`, 1),
    number(`CDELT${axis + 1}`, 1),
    number(`CRPIX${axis + 1}`, 1),
  ];
  return (k) => NAMES[Math.round(value + step * (k + 1 - pixel))] ?? `plane ${k + 1}`;
}
