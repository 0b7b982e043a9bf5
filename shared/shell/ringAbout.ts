import { separation } from '@/shared/sky/greatCircle';
import type { RingMark } from '@/shared/shell/ring';

/**
 * The radius of a ring about a known centre: the weighted mean angle of its marks, for which two are enough. Degrees.
 *
 * Its standard error comes from the marks' sigma where all carry one, else from their scatter; null where neither tells
 * (one mark without sigma).
 *
 * @returns null where there is no mark
 */
export function ringAbout(
  centre: { l: number; b: number },
  marks: readonly RingMark[],
): { theta: number; se: number | null } | null {
  if (marks.length === 0) return null;
  const stated = marks.every((m) => m.sigma !== undefined && m.sigma > 0);
  const angles = marks.map((m) => separation({ lon: centre.l, lat: centre.b }, { lon: m.l, lat: m.b }));
  const weight = marks.map((m) => (stated ? 1 / m.sigma! ** 2 : 1));
  const total = weight.reduce((sum, w) => sum + w, 0);
  const theta = angles.reduce((sum, angle, i) => sum + weight[i]! * angle, 0) / total;
  if (stated) return { theta, se: Math.sqrt(1 / total) };
  if (marks.length < 2) return { theta, se: null };
  const scatter = angles.reduce((sum, angle) => sum + (angle - theta) ** 2, 0) / (marks.length - 1);
  return { theta, se: Math.sqrt(scatter / marks.length) };
}
