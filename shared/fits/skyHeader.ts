import { Problem } from '@/shared/contract/problem';
import type { SkyFrame, SkySpec } from '@/shared/sky/wcsSpec';
import type { Header } from './header';
import type { SkyStep } from './linearStep';
import type { SkyAxes } from './skyAxes';
import { angleUnit } from './units';

/**
 * The sky part of the world coordinates a header describes, in degrees.
 *
 * @param cautions sentences are added for what was doubtful
 * @throws Problem fits-card
 */
export function skyOfHeader(header: Header, axes: SkyAxes, step: SkyStep, cautions: string[]): SkySpec {
  const { longitude, latitude, naxis } = axes;
  const lonUnit = degreesPerUnit(header, longitude, cautions);
  const latUnit = degreesPerUnit(header, latitude, cautions);
  const [a, b, c, d] = step.matrix;
  const spec: SkySpec = {
    ...frameOf(header, axes, cautions),
    projection: axes.projection ?? 'CAR',
    referencePixel: step.referencePixel,
    reference: [
      reference(header, longitude, cautions) * lonUnit,
      reference(header, latitude, cautions) * latUnit,
    ],
    matrix: [a * lonUnit, b * lonUnit, c * latUnit, d * latUnit],
    lonPole: header.number('LONPOLE') ?? header.number(`PV${longitude + 1}_3`),
    latPole: header.number('LATPOLE') ?? header.number(`PV${longitude + 1}_4`),
    parameters: parametersOf(header, latitude + 1),
    size: [naxis[longitude]!, naxis[latitude]!],
  };
  for (const m of [0, 1, 2]) {
    const card = `PV${longitude + 1}_${m}`;
    if (header.number(card))
      throw new Problem(
        'fits-card',
        `${card} moves the reference point of the projection, which is not read.`,
        { card },
      );
  }
  requireSense(spec, axes);
  return withoutMinusZero(axes.projection === null ? unprojected(spec, cautions) : spec);
}

/** JSON does not keep the sign of zero, so none is given. */
function withoutMinusZero(spec: SkySpec): SkySpec {
  const [a, b, c, d] = spec.matrix;
  const [x, y] = spec.referencePixel;
  const [lon, lat] = spec.reference;
  return {
    ...spec,
    matrix: [a + 0, b + 0, c + 0, d + 0],
    referencePixel: [x + 0, y + 0],
    reference: [lon + 0, lat + 0],
  };
}

/** No pixel spans more than the whole sky, and no image is so many pixels from its reference. */
function requireSense(
  { matrix, reference, referencePixel }: SkySpec,
  { longitude, latitude }: SkyAxes,
): void {
  const [a, b, c, d] = matrix.map(Math.abs) as SkySpec['matrix'];
  if (!(Math.max(a, b, c, d) <= 360)) {
    const card = `CDELT${(Math.max(a, b) <= 360 ? latitude : longitude) + 1}`;
    throw new Problem('fits-card', `${card} (or the matrix beside it) makes a pixel larger than the sky.`, {
      card,
    });
  }
  if (!(Math.abs(reference[0]) <= 1e6)) {
    const card = `CRVAL${longitude + 1}`;
    throw new Problem('fits-card', `${card} is no longitude: it is more than a million degrees.`, { card });
  }
  if (!(Math.max(...referencePixel.map(Math.abs)) <= 1e9)) {
    const card = `CRPIX${(Math.abs(referencePixel[0]) <= 1e9 ? latitude : longitude) + 1}`;
    throw new Problem('fits-card', `${card} lies more than a thousand million pixels from the image.`, {
      card,
    });
  }
}

/**
 * Sky axes without a projection code count longitude and latitude themselves: that is CAR about the equator, with
 * the reference pixel moved there along the latitude axis.
 */
function unprojected(spec: SkySpec, cautions: string[]): SkySpec {
  cautions.push('CTYPE gives no projection; longitude and latitude are taken as linear in the pixels.');
  const [a, b, c, d] = spec.matrix;
  const [x, y] = spec.referencePixel;
  const lat = spec.reference[1];
  const determinant = a * d - b * c;
  return {
    ...spec,
    reference: [spec.reference[0], 0],
    referencePixel: [x + (b * lat) / determinant, y - (a * lat) / determinant],
    lonPole: null,
    latPole: null,
  };
}

function reference(header: Header, axis: number, cautions: string[]): number {
  const keyword = `CRVAL${axis + 1}`;
  if (!header.has(keyword)) cautions.push(`${keyword} is missing; it is 0 by the standard.`);
  return header.number(keyword) ?? 0;
}

function degreesPerUnit(header: Header, axis: number, cautions: string[]): number {
  const card = `CUNIT${axis + 1}`;
  const unit = header.text(card);
  if (unit === null) return 1;
  const read = angleUnit(unit);
  if (!read)
    throw new Problem('fits-card', `${card} = '${unit}' is no unit of angle that can be read.`, { card });
  if (!read.exact) cautions.push(`${card} = '${unit}' is read without regard to capitals.`);
  return read.factor;
}

function parametersOf(header: Header, axis: number): (number | null)[] {
  const parameters = Array.from({ length: 21 }, (_, m) => header.number(`PV${axis}_${m}`));
  while (parameters.length > 0 && parameters.at(-1) === null) parameters.pop();
  return parameters;
}

/**
 * Frame and equinox. Without RADESYS: FK4 when the equinox is before 1984, FK5 from then on, ICRS when there is none
 * (Calabretta & Greisen 2002, section 3.1).
 */
function frameOf(
  header: Header,
  axes: SkyAxes,
  cautions: string[],
): { frame: SkyFrame; equinox: number | null } {
  if (axes.system === 'galactic') return { frame: 'galactic', equinox: null };
  const equinox = equinoxOf(header, cautions);
  const named = (header.text('RADESYS') ?? header.text('RADECSYS'))?.toUpperCase() ?? null;
  switch (named ?? (equinox === null ? 'ICRS' : equinox < 1984 ? 'FK4' : 'FK5')) {
    case 'ICRS':
      return { frame: 'icrs', equinox: null };
    case 'FK5':
      return { frame: 'fk5', equinox: equinox ?? 2000 };
    case 'FK4':
      return { frame: 'fk4', equinox: equinox ?? 1950 };
    case 'FK4-NO-E':
      return { frame: 'fk4-no-e', equinox: equinox ?? 1950 };
    default:
      throw new Problem('fits-card', `RADESYS = '${named}' is none of ICRS, FK5, FK4, FK4-NO-E.`, {
        card: 'RADESYS',
      });
  }
}

function equinoxOf(header: Header, cautions: string[]): number | null {
  const keyword = header.has('EQUINOX') ? 'EQUINOX' : 'EPOCH';
  const year = /^['\s]*[JB](\d{4}(\.\d+)?)/i.exec(header.text(keyword) ?? '')?.[1];
  if (year !== undefined) {
    cautions.push(`${keyword} = '${header.text(keyword)}' is read as ${year}.`);
    return Number(year);
  }
  const equinox = header.number(keyword);
  if (equinox !== null && !(equinox > 1500 && equinox < 2500)) {
    throw new Problem('fits-card', `${keyword} = ${equinox} is no year of an equinox.`, { card: keyword });
  }
  return equinox;
}
