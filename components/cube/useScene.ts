import { useMemo } from 'react';
import { beamOutline, type Beam } from '@/components/map/beamOutline';
import type { Scene, SceneMark } from '@/components/map/scene';
import type { StripOrder } from '@/components/strip/stripOrder';
import type { PlacedMark } from '@/hooks/reading/placedMark';
import type { ChannelReading } from '@/hooks/reading/skyMarks';
import { graticule } from '@/shared/image/graticule';
import { ringPath, type Project } from '@/shared/image/skyPath';
import type { Viewport } from '@/shared/image/viewport';
import { modelRadius } from '@/shared/shell/channelCurve';
import type { Wcs } from '@/shared/sky/wcs';

/** Channels to each side whose marks are seen faintly. */
const NEIGHBOURS = 2;

export interface SceneModel {
  l: number;
  b: number;
  theta: number;
  vSys: number;
  vExp: number;
}

export interface SceneInput {
  wcs: Wcs;
  image: { nx: number; ny: number };
  order: StripOrder;
  channel: number;
  channelWidth: number;
  /** The picture is a map of all channels: no marks lie on it, and the model shows its widest ring. */
  allChannels: boolean;
  marks: readonly PlacedMark[];
  selected: string | null;
  readings: readonly ChannelReading[];
  model: SceneModel | null;
  beam: Beam | null;
  grid: 'galactic' | 'own' | 'off';
}

/** What lies over the map, in image pixels; every ring is a circle on the sky, drawn where the projection puts it. */
export function useScene(input: SceneInput): Scene {
  const { wcs, image, order, channel, channelWidth, marks, selected, readings, model, beam, grid } = input;
  const { allChannels } = input;
  const { nx, ny } = image;
  const jump = Math.max(nx, ny) / 2;
  const galactic = useMemo<Project>(
    () =>
      ({ lon, lat }) =>
        wcs.galacticToPixel(lon, lat),
    [wcs],
  );

  const lines = useMemo(() => {
    if (grid === 'off') return null;
    const project: Project = grid === 'galactic' ? galactic : ({ lon, lat }) => wcs.skyToPixel(lon, lat);
    const unproject = (x: number, y: number) => {
      if (grid === 'own') return wcs.pixelToSky(x, y);
      const at = wcs.pixelToGalactic(x, y);
      return at && { lon: at.l, lat: at.b };
    };
    return (v: Viewport) => graticule(v, { project, unproject });
  }, [wcs, grid, galactic]);

  const outline = useMemo(() => {
    const at = wcs.pixelToSky((nx - 1) / 2, (ny - 1) / 2);
    return beam && at ? beamOutline(beam, at, ({ lon, lat }) => wcs.skyToPixel(lon, lat)) : null;
  }, [wcs, beam, nx, ny]);

  const sceneMarks = useMemo<SceneMark[]>(() => {
    if (allChannels) return [];
    const here = order.positions[channel] ?? 0;
    return marks.flatMap((mark) => {
      const away = (order.positions[mark.channel] ?? Infinity) - here;
      if (Math.abs(away) > NEIGHBOURS) return [];
      return [{ id: mark.id, x: mark.x, y: mark.y, away, selected: mark.id === selected }];
    });
  }, [marks, order, channel, selected, allChannels]);

  const velocity = wcs.velocityOf(channel);
  const modelRing = useMemo(() => {
    if (!model) return null;
    const radius = allChannels ? model.theta : modelRadius(velocity, channelWidth, model);
    return radius === null || radius <= 0
      ? null
      : ringPath({ lon: model.l, lat: model.b }, radius, galactic, jump);
  }, [model, velocity, channelWidth, allChannels, galactic, jump]);

  const own = allChannels ? null : (readings.find((r) => r.channel === channel)?.ring ?? null);
  const ownRing = useMemo(
    () => (own ? ringPath({ lon: own.l, lat: own.b }, own.theta, galactic, jump) : null),
    [own, galactic, jump],
  );
  const centre = useMemo(
    () =>
      model ? galactic({ lon: model.l, lat: model.b }) : own ? galactic({ lon: own.l, lat: own.b }) : null,
    [model, own, galactic],
  );

  return useMemo<Scene>(
    () => ({ graticule: lines, marks: sceneMarks, modelRing, ownRing, centre, beam: outline }),
    [lines, sceneMarks, modelRing, ownRing, centre, outline],
  );
}
