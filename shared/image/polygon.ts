import type { ImagePoint } from '@/shared/image/viewport';

/** Whether a point lies inside a closed line, by the number of its edges that a ray to the right crosses (even-odd). */
export function inPolygon(line: readonly ImagePoint[], { x, y }: ImagePoint): boolean {
  let inside = false;
  line.forEach((a, i) => {
    const b = line[(i + 1) % line.length]!;
    if (a.y > y !== b.y > y && x < a.x + ((y - a.y) / (b.y - a.y)) * (b.x - a.x)) inside = !inside;
  });
  return inside;
}
