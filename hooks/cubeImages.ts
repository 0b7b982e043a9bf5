import { API } from '@/hooks/api';
import type { Cube } from '@/shared/contract/cubes';

/**
 * Address of one of a cube's pictures or planes. Browsers keep what they have of it for good; what is read again from
 * another part of the file has another address.
 */
export const cubeImage = (cube: Pick<Cube, 'id' | 'readyAt'>, path: string): string => {
  const reading = cube.readyAt ? `${path.includes('?') ? '&' : '?'}v=${Date.parse(cube.readyAt)}` : '';
  return `${API}/cubes/${cube.id}/${path}${reading}`;
};
