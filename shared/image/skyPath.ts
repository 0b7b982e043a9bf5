import type { ImagePoint } from '@/shared/image/viewport';
import { destination, type LonLat } from '@/shared/sky/greatCircle';

/** Where a place on the sky lies in the image; null where the projection cannot show it. */
export type Project = (at: LonLat) => ImagePoint | null;

/** Connected pieces of a line on the sky, in image pixels. */
export type Path = ImagePoint[][];

/**
 * Draw a line on the sky (or of another image) in the image: a run of places becomes pieces, cut where the projection shows nothing and
 * where it jumps (the seam of an all-sky map): between neighbouring places further apart than `jump` pixels.
 */
export function pathThrough<Place>(
  places: Iterable<Place>,
  project: (place: Place) => ImagePoint | null,
  jump: number,
): Path {
  const path: Path = [];
  let piece: ImagePoint[] = [];
  const close = () => {
    if (piece.length > 1) path.push(piece);
    piece = [];
  };
  for (const place of places) {
    const at = project(place);
    if (!at) {
      close();
      continue;
    }
    const before = piece[piece.length - 1];
    if (before && Math.hypot(at.x - before.x, at.y - before.y) > jump) close();
    piece.push(at);
  }
  close();
  return path;
}

/** So many that the chords stay within a twentieth of a pixel of a circle 5000 screen pixels in radius. */
const RING_POINTS = 720;

/**
 * A circle on the sky: every place at one great-circle distance from a centre. In the image it is round only as far
 * as the projection keeps it so.
 *
 * @param radius degrees, 0 … 180
 */
export function ringPath(centre: LonLat, radius: number, project: Project, jump: number): Path {
  const places = Array.from({ length: RING_POINTS + 1 }, (_, i) =>
    destination(centre, (360 * (i % RING_POINTS)) / RING_POINTS, radius),
  );
  return pathThrough(places, project, jump);
}
