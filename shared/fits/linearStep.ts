import { Problem } from '@/shared/contract/problem';
import type { CubeAxes } from './cubeAxes';
import type { Header } from './header';
import type { SkyAxes } from './skyAxes';

/** The linear part of the sky coordinates, in the header's own units: pixels (from 0) to intermediate coordinates. */
export interface SkyStep {
  referencePixel: [number, number];
  matrix: [number, number, number, number];
}

/** The same of a cube, with its spectral axis. */
export interface LinearStep {
  sky: SkyStep;
  spectral: { referenceChannel: number; step: number };
}

/**
 * Reference pixels and matrix, from CDi_j, PCi_j with CDELTi, or CDELTi with CROTAi, rows and columns put in the
 * order longitude, latitude.
 *
 * @param cautions sentences are added for reference pixels and steps that the header leaves to the default
 * @throws Problem fits-card when a step is zero or the spectral axis is tied to the sky
 */
export function linearStep(header: Header, axes: CubeAxes, cautions: string[]): LinearStep {
  const { spectral } = axes;
  const cards = matrixCards(header, axes.naxis, cautions);
  const sky = skyStep(header, axes, cautions);
  cards.doubtStep(spectral);
  refuseTies(cards, axes.naxis, [spectral]);
  const step = cards.element(spectral, spectral);
  if (step === 0) {
    const card = `CD${spectral + 1}_${spectral + 1}`;
    throw new Problem('fits-card', `${card} is zero: all channels would have one velocity.`, { card });
  }
  return { sky, spectral: { referenceChannel: cards.pixel(spectral), step } };
}

/**
 * The part of the sky axes alone, of a cube or of an image.
 *
 * @throws Problem fits-card when a step is zero or another axis is tied to the sky
 */
export function skyStep(header: Header, axes: SkyAxes, cautions: string[]): SkyStep {
  const { longitude, latitude, naxis } = axes;
  const cards = matrixCards(header, naxis, cautions);
  const { pixel, element, delta, rowHasCd } = cards;
  cards.doubtStep(longitude);
  cards.doubtStep(latitude);
  refuseTies(cards, naxis, [longitude, latitude]);
  const anyPc = header.cards.some(({ keyword }) => /^PC\d+_\d+$/.test(keyword));
  const isRotated = !anyPc && !rowHasCd(longitude) && !rowHasCd(latitude);
  const rotation = isRotated ? (header.number(`CROTA${latitude + 1}`) ?? 0) : 0;
  return {
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
  };
}

type MatrixCards = ReturnType<typeof matrixCards>;

/** The cards of the linear part, with what the standard takes where one is missing. Axes count from 0. */
function matrixCards(header: Header, naxis: number[], cautions: string[]) {
  const number = (keyword: string, fallback: number) => header.number(keyword) ?? fallback;
  const rowHasCd = (i: number) => naxis.some((_, j) => header.has(`CD${i + 1}_${j + 1}`));
  const delta = (axis: number): number => {
    const card = `CDELT${axis + 1}`;
    const value = number(card, 1);
    if (value === 0) {
      throw new Problem('fits-card', `${card} is zero: all pixels along that axis would be at one place.`, {
        card,
      });
    }
    return value;
  };
  return {
    rowHasCd,
    delta,
    element(i: number, j: number): number {
      if (rowHasCd(i)) return number(`CD${i + 1}_${j + 1}`, 0);
      return number(`PC${i + 1}_${j + 1}`, i === j ? 1 : 0) * delta(i) + 0; // never -0, which JSON loses
    },
    pixel(axis: number): number {
      const keyword = `CRPIX${axis + 1}`;
      if (!header.has(keyword)) cautions.push(`${keyword} is missing; it is 0 by the standard.`);
      return number(keyword, 0) - 1; // FITS counts pixels from 1
    },
    doubtStep(axis: number): void {
      if (!rowHasCd(axis) && !header.has(`CDELT${axis + 1}`))
        cautions.push(`CDELT${axis + 1} is missing; it is 1 by the standard.`);
    },
  };
}

/** CDELT with the old CROTA of the latitude axis (Calabretta & Greisen 2002, equation 189). */
function rotated(dx: number, dy: number, degrees: number): [number, number, number, number] {
  const c = Math.cos((degrees * Math.PI) / 180);
  const s = Math.sin((degrees * Math.PI) / 180);
  return [dx * c, -dy * s, dx * s, dy * c];
}

/** The coordinates of these axes may depend on the pixels along them, and on no others. */
function refuseTies({ element, rowHasCd }: MatrixCards, naxis: number[], together: number[]): void {
  for (const i of together)
    naxis.forEach((_, j) => {
      if (together.includes(j) || element(i, j) === 0) return;
      const card = `${rowHasCd(i) ? 'CD' : 'PC'}${i + 1}_${j + 1}`;
      throw new Problem('fits-card', `${card} ties the sky axes to another axis; such images are not read.`, {
        card,
      });
    });
}
