import type { CubeSession } from '@/components/cube/cubeSession';
import type { FigurePanel } from '@/shared/image/figure/figure';
import { ringPath, type Project } from '@/shared/image/skyPath';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { modelRadius } from '@/shared/shell/channelCurve';

type Drawn = Pick<CubeSession, 'axes' | 'wcs' | 'marks' | 'live' | 'model'>;

export const velocityOf = ({ axes, wcs }: Pick<Drawn, 'axes' | 'wcs'>, channel: number): string =>
  `${velocityLabel(wcs.velocityOf(channel), axes.spectral.channelWidth)} km/s`;

/** What lies on one channel of the image: its marks, the circle through them, the model's ring. */
export function channelPanel(s: Drawn, channel: number): FigurePanel {
  const { axes, wcs, marks, live, model } = s;
  const galactic: Project = ({ lon, lat }) => wcs.galacticToPixel(lon, lat);
  const jump = Math.max(axes.nx, axes.ny) / 2;
  const circle = (l: number, b: number, radius: number | null) =>
    radius !== null && radius > 0 ? ringPath({ lon: l, lat: b }, radius, galactic, jump) : null;
  const own = live.readings.find((r) => r.channel === channel)?.ring ?? null;
  return {
    raster: null,
    label: velocityOf(s, channel),
    marks: marks
      .filter((m) => m.channel === channel)
      .map(({ x, y, unsure }) => ({ x, y, ...(unsure && { unsure }) })),
    ownRing: own && circle(own.l, own.b, own.theta),
    modelRing:
      model &&
      circle(model.l, model.b, modelRadius(wcs.velocityOf(channel), axes.spectral.channelWidth, model)),
    centre: model && galactic({ lon: model.l, lat: model.b }),
  };
}
