import { DEGREE, eastNorth, type Vector } from '@/shared/sky/greatCircle';
import { centroid, subset, type MarkSet } from '@/shared/shell/markSet';
import { median } from '@/shared/shell/robust';

/** Position angles covered by the marks as seen from a centre, degrees: 360 less the largest gap. */
export function arcCovered(marks: MarkSet, centre: Vector): number {
  if (marks.count < 2) return 0;
  const angles = planeCoordinates(marks, centre)
    .map(([x, y]) => Math.atan2(x, y) / DEGREE)
    .sort((a, b) => a - b);
  const gaps = angles.map((angle, i) => (angles[i + 1] ?? angles[0]! + 360) - angle);
  return 360 - Math.max(...gaps);
}

/** Scatter alone spreads a channel's marks over about this many sigma. */
const SCATTER_RANGE = 3;

/**
 * How far the rings rise above a straight line, in sigma: per channel of at least four marks their range along the
 * minor principal axis over sigma, less what scatter alone makes; the median over the channels. Taken from the marks
 * alone, because a fit to a short noisy arc can collapse on to its marks, and the arc seen from the fitted centre then
 * looks long.
 */
export function riseAboveLine(marks: MarkSet): number {
  const rises: number[] = [];
  for (let k = 0; k < marks.channels; k++) {
    const ring = subset(marks, (i) => marks.channel[i] === k);
    if (ring.count < 4) continue;
    const points = planeCoordinates(ring, centroid(ring));
    const mean = [0, 1].map((a) => points.reduce((sum, p) => sum + p[a]!, 0) / points.length);
    let [xx, xy, yy] = [0, 0, 0];
    for (const p of points) {
      const [x, y] = [p[0] - mean[0]!, p[1] - mean[1]!];
      [xx, xy, yy] = [xx + x * x, xy + x * y, yy + y * y];
    }
    const minor = 0.5 * Math.atan2(2 * xy, xx - yy) + Math.PI / 2; // direction of the smaller variance
    const along = points.map(([x, y]) => x * Math.cos(minor) + y * Math.sin(minor));
    const sigma = Math.sqrt(median(ring.sigma2));
    rises.push((Math.max(...along) - Math.min(...along)) / sigma - SCATTER_RANGE);
  }
  return rises.length > 0 ? median(rises) : 0;
}

/** Sines of the marks' offsets east and north of a direction. */
function planeCoordinates(marks: MarkSet, at: Vector): [number, number][] {
  const { east, north } = eastNorth(at);
  return Array.from({ length: marks.count }, (_, i) => {
    const [x, y, z] = marks.direction.subarray(3 * i, 3 * i + 3) as unknown as Vector;
    return [x * east[0] + y * east[1] + z * east[2], x * north[0] + y * north[1] + z * north[2]];
  });
}
