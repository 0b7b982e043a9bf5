import { DEGREE, eastNorth, type Vector } from '@/shared/sky/greatCircle';
import { allOf, centroid, type MarkSet } from '@/shared/shell/markSet';
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
  const ofChannel: number[][] = Array.from({ length: marks.channels }, () => []);
  for (let i = 0; i < marks.count; i++) ofChannel[marks.channel[i]!]!.push(i);
  const rises: number[] = [];
  for (const members of ofChannel) {
    if (members.length < 4) continue;
    const points = planeCoordinates(marks, centroid(marks, members), members);
    const meanX = points.reduce((sum, [x]) => sum + x, 0) / points.length;
    const meanY = points.reduce((sum, [, y]) => sum + y, 0) / points.length;
    let [xx, xy, yy] = [0, 0, 0];
    for (const [x, y] of points) {
      xx += (x - meanX) ** 2;
      xy += (x - meanX) * (y - meanY);
      yy += (y - meanY) ** 2;
    }
    const minor = 0.5 * Math.atan2(2 * xy, xx - yy) + Math.PI / 2; // direction of the smaller variance
    const across = points.map(([x, y]) => x * Math.cos(minor) + y * Math.sin(minor));
    const sigma = Math.sqrt(median(members.map((i) => marks.sigma2[i]!)));
    rises.push((Math.max(...across) - Math.min(...across)) / sigma - SCATTER_RANGE);
  }
  return rises.length > 0 ? median(rises) : 0;
}

/** Sines of the marks' offsets east and north of a direction. */
function planeCoordinates(marks: MarkSet, at: Vector, members = allOf(marks)): [number, number][] {
  const { east, north } = eastNorth(at);
  const { direction: q } = marks;
  return members.map((i) => {
    const [x, y, z] = [q[3 * i]!, q[3 * i + 1]!, q[3 * i + 2]!];
    return [x * east[0] + y * east[1] + z * east[2], x * north[0] + y * north[1] + z * north[2]];
  });
}
