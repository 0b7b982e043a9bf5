const PARSEC_PER_DEGREE = Math.PI / 180;

export interface ScaleBar {
  degrees: number;
  label: string;
}

/** Lengths an angle bar may have, arcseconds: whole seconds, minutes, degrees. */
const LENGTHS = [1, 2, 5, 10, 20, 30, 60, 120, 300, 600, 1200, 1800, 3600, 7200, 18_000, 36_000, 72_000];

/**
 * A bar of a round angle, no longer than `most` degrees, with what it spans at a distance.
 *
 * @param distancePc null where no distance is known
 * @returns null when even the shortest is too long
 */
export function scaleBar(most: number, distancePc: number | null): ScaleBar | null {
  const seconds = LENGTHS.findLast((s) => s <= most * 3600);
  if (seconds === undefined) return null;
  const angle = seconds >= 3600 ? `${seconds / 3600}°` : seconds >= 60 ? `${seconds / 60}′` : `${seconds}″`;
  const degrees = seconds / 3600;
  if (distancePc === null) return { degrees, label: angle };
  const parsecs = degrees * PARSEC_PER_DEGREE * distancePc;
  const digits = parsecs >= 100 ? 0 : parsecs >= 10 ? 1 : 2;
  return { degrees, label: `${angle} · ${parsecs.toFixed(digits)} pc` };
}
