import type { GalacticPoint, Sky } from '@/shared/sky/wcs';
import { pathThrough, type Path } from './skyPath';
import type { ImagePoint } from './viewport';

/**
 * Lay lines of one image on another picture of the same sky: each vertex goes from its pixel to the sky and from there
 * to the other's pixel. Straight pieces between vertices stay straight, so vertices should be no further apart than a
 * few pixels, as those of contours are.
 *
 * @param lines vertices in pixels of a plane that was reduced by block averages; from 0 at pixel centres
 * @param block pixels of the image along a side of one of the plane's; 1: the plane is whole
 * @param from  the image that the lines belong to
 * @param to    the pixel of the picture at a place; null where it shows none
 * @param jump  neighbours further apart than so many pixels of the picture are not joined
 */
export function linesAcross(
  lines: readonly ImagePoint[][],
  block: number,
  from: Pick<Sky, 'pixelToGalactic'>,
  to: (at: GalacticPoint) => ImagePoint | null,
  jump: number,
): Path {
  const whole = (at: number) => block * (at + 0.5) - 0.5;
  const across = ({ x, y }: ImagePoint) => {
    const place = from.pixelToGalactic(whole(x), whole(y));
    return place && to(place);
  };
  return lines.flatMap((line) => pathThrough(line, across, jump));
}
