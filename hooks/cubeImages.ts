import { API } from '@/hooks/api';
import type { Cube } from '@/shared/contract/cubes';
import type { SkyImage } from '@/shared/contract/images';

/**
 * Address of one of a cube's pictures or planes. Browsers keep what they have of it for good; what is read again from
 * another part of the file has another address.
 * Give `overrides` for what depends on how the cube is understood: a map of velocities does, the pixels do not.
 */
export const cubeImage = (
  cube: Pick<Cube, 'id' | 'readyAt'> & Partial<Pick<Cube, 'overrides'>>,
  path: string,
): string => {
  const times = [cube.readyAt, cube.overrides?.at].flatMap((time) => (time ? [Date.parse(time)] : []));
  const version = times.length > 0 ? `${path.includes('?') ? '&' : '?'}v=${Math.max(...times)}` : '';
  return `${API}/cubes/${cube.id}/${path}${version}`;
};

/** Address of the numbers of a companion image, at most `size` pixels on its longer side. Its bytes never change. */
export const skyImagePlane = ({ id }: Pick<SkyImage, 'id'>, size: number): string =>
  `${API}/images/${id}/plane?size=${size}`;
