import { Problem } from '@/shared/contract/problem';
import type { CubeAxes } from './cubeAxes';
import type { Header } from './header';

/** The linear part of world coordinates, in the header's own units: pixels (from 0) to intermediate coordinates. */
export interface LinearStep {
  sky: { referencePixel: [number, number]; matrix: [number, number, number, number] };
  spectral: { referenceChannel: number; step: number };
  /** Which keyword family gave the sky matrix: for messages. */
  family: 'CD' | 'PC' | 'CDELT';
}

/**
 * Reference pixels and matrix, from CDi_j, PCi_j with CDELTi, or CDELTi with CROTAi, rows and columns put in the
 * order longitude, latitude.
 *
 * @param cautions sentences are added for reference pixels and steps that the header leaves to the default
 * @throws Problem fits-card when a step is zero or the spectral axis is tied to the sky
 */
export function linearStep(header: Header, axes: CubeAxes, cautions: string[]): LinearStep {
  const { longitude, latitude, spectral, naxis } = axes;
  const number = (keyword: string, fallback: number) => header.number(keyword) ?? fallback;
  const pixel = (axis: number) => {
    const keyword = `CRPIX${axis + 1}`;
    if (!header.has(keyword)) cautions.push(`${keyword} is missing; it is 0 by the standard.`);
    return number(keyword, 0) - 1; // FITS counts pixels from 1
  };
  const rowHasCd = (i: number) => naxis.some((_, j) => header.has(`CD${i + 1}_${j + 1}`));
  const element = (i: number, j: number): number => {
    if (rowHasCd(i)) return number(`CD${i + 1}_${j + 1}`, 0);
    return number(`PC${i + 1}_${j + 1}`, i === j ? 1 : 0) * delta(i) + 0; // never -0, which JSON loses
  };
  const delta = (axis: number): number => {
    const keyword = `CDELT${axis + 1}`;
    const value = number(keyword, 1);
    if (value === 0) {
      throw new Problem(
        'fits-card',
        `${keyword} is zero: all pixels along that axis would be at one place.`,
        {
          card: keyword,
        },
      );
    }
    return value;
  };
  const wanted = [longitude, latitude, spectral];
  for (const axis of wanted) {
    if (!rowHasCd(axis) && !header.has(`CDELT${axis + 1}`)) {
      cautions.push(`CDELT${axis + 1} is missing; it is 1 by the standard.`);
    }
  }
  const anyCd = rowHasCd(longitude) || rowHasCd(latitude);
  const anyPc = wanted.some((i) => wanted.some((j) => header.has(`PC${i + 1}_${j + 1}`)));
  refuseTies(element, axes, (i) => (rowHasCd(i) ? 'CD' : 'PC'));
  const step = element(spectral, spectral);
  if (step === 0) {
    const card = `CD${spectral + 1}_${spectral + 1}`;
    throw new Problem('fits-card', `${card} is zero: all channels would have one velocity.`, { card });
  }
  const rotation = anyCd || anyPc ? 0 : number(`CROTA${latitude + 1}`, 0);
  return {
    sky: {
      referencePixel: [pixel(longitude), pixel(latitude)],
      matrix:
        rotation === 0
          ? [
              element(longitude, longitude),
              element(longitude, latitude),
              element(latitude, longitude),
              element(latitude, latitude),
            ]
          : rotated(delta(longitude), delta(latitude), rotation),
    },
    spectral: { referenceChannel: pixel(spectral), step },
    family: anyCd ? 'CD' : anyPc ? 'PC' : 'CDELT',
  };
}

/** CDELT with the old CROTA of the latitude axis (Calabretta & Greisen 2002, equation 189). */
function rotated(dx: number, dy: number, degrees: number): [number, number, number, number] {
  const c = Math.cos((degrees * Math.PI) / 180);
  const s = Math.sin((degrees * Math.PI) / 180);
  return [dx * c, -dy * s, dx * s, dy * c];
}

function refuseTies(
  element: (i: number, j: number) => number,
  axes: CubeAxes,
  family: (i: number) => string,
): void {
  const sky = [axes.longitude, axes.latitude];
  axes.naxis.forEach((_, i) =>
    axes.naxis.forEach((_length, j) => {
      const used = i === axes.spectral || sky.includes(i);
      const together = i === j || (sky.includes(i) && sky.includes(j));
      if (!used || together || element(i, j) === 0) return;
      const card = `${family(i)}${i + 1}_${j + 1}`;
      throw new Problem('fits-card', `${card} ties the sky axes to another axis; such cubes are not read.`, {
        card,
      });
    }),
  );
}
