import type { SkyMapping } from '@/shared/image/graticule';
import { fromGalactic, toGalactic } from '@/shared/sky/frames';
import type { SkyView } from '@/shared/sky/polarView';

/** A picture's pixels in galactic coordinates, or in equatorial ones: the cube's own where it has them, else ICRS. */
export function skyMapping(sky: SkyView, frame: string, grid: 'galactic' | 'equatorial'): SkyMapping {
  if (grid === 'galactic')
    return {
      project: ({ lon, lat }) => sky.galacticToPixel(lon, lat),
      unproject: (x, y) => {
        const at = sky.pixelToGalactic(x, y);
        return at && { lon: at.l, lat: at.b };
      },
    };
  if (frame !== 'galactic')
    return {
      project: ({ lon, lat }) => sky.skyToPixel(lon, lat),
      unproject: (x, y) => sky.pixelToSky(x, y),
    };
  return {
    project: (at) => {
      const { l, b } = toGalactic(at, 'icrs');
      return sky.galacticToPixel(l, b);
    },
    unproject: (x, y) => {
      const at = sky.pixelToGalactic(x, y);
      return at && fromGalactic(at.l, at.b, 'icrs');
    },
  };
}
