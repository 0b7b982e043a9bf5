import { useMemo } from 'react';
import type { Lie, Seeing } from '@/components/seeing/seeing';
import type { PictureView } from '@/hooks/planes/makePicture';
import type { ImagePoint } from '@/shared/image/viewport';
import { polarView, stereographicView, type SkyView } from '@/shared/sky/polarView';
import type { Wcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

/** How the picture that is shown lies on the sky and on the cube's image. */
export interface SeenSky {
  sky: SkyView;
  nx: number;
  ny: number;
  lie: Lie;
  /** Degrees to the lower edge of a polar view. */
  reach: number;
  /** null: the image itself. */
  view: PictureView | null;
  fromImage: (at: ImagePoint) => ImagePoint | null;
  toImage: (at: ImagePoint) => ImagePoint | null;
}

/** Pixels of the views: fine enough for a wide screen; a stack, made of many channels, is coarser. */
const SIZES = { stereographic: [512, 512], polar: [720, 300], stacked: [240, 120] } as const;

const same = (at: ImagePoint): ImagePoint => at;

export function useSeenSky(
  { lie, about }: Pick<Seeing, 'lie' | 'about'>,
  image: { nx: number; ny: number },
  wcs: Wcs,
  spec: WcsSpec,
): SeenSky {
  const { nx, ny } = image;
  return useMemo<SeenSky>(() => {
    if (lie === 'image' || !about)
      return { sky: wcs, nx, ny, lie: 'image', reach: 0, view: null, fromImage: same, toImage: same };
    const [width, height] = SIZES[lie];
    const { reach, ...centre } = about;
    const view: PictureView = {
      kind: lie === 'stereographic' ? 'stereographic' : 'polar',
      centre,
      reach,
      nx: width,
      ny: height,
    };
    const sky =
      lie === 'stereographic'
        ? stereographicView(centre, reach, width, spec)
        : polarView({ centre, reach, nx: width, ny: height }, wcs);
    // the stereographic map speaks galactic as its own frame; the cube's own goes through the cube
    const own: SkyView =
      lie === 'stereographic'
        ? {
            ...sky,
            pixelToSky(x, y) {
              const at = toImage({ x, y });
              return at && wcs.pixelToSky(at.x, at.y);
            },
            skyToPixel(lon, lat) {
              const at = wcs.skyToPixel(lon, lat);
              return at && fromImage(at);
            },
          }
        : sky;
    function fromImage(at: ImagePoint) {
      const g = wcs.pixelToGalactic(at.x, at.y);
      return g && sky.galacticToPixel(g.l, g.b);
    }
    function toImage(at: ImagePoint) {
      const g = sky.pixelToGalactic(at.x, at.y);
      return g && wcs.galacticToPixel(g.l, g.b);
    }
    return { sky: own, nx: width, ny: height, lie, reach, view, fromImage, toImage };
  }, [lie, about, nx, ny, wcs, spec]);
}
