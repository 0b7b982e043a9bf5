import { useMemo } from 'react';
import { beamOutline, type Beam } from '@/components/map/beamOutline';
import type { Scene, SceneMark } from '@/components/map/scene';
import type { StripOrder } from '@/components/strip/stripOrder';
import { furnitureOf } from '@/components/map/furniture';
import type { Grid, Notation } from '@/components/seeing/coordinateWords';
import { polarLines } from '@/components/seeing/polarLines';
import { skyMapping } from '@/components/seeing/skyMapping';
import type { SeenSky } from '@/components/seeing/useSeenSky';
import type { PlacedMark } from '@/hooks/reading/placedMark';
import type { ChannelReading } from '@/hooks/reading/skyMarks';
import { graticule } from '@/shared/image/graticule';
import { ringPath, type Project } from '@/shared/image/skyPath';
import type { Viewport } from '@/shared/image/viewport';
import { modelRadius } from '@/shared/shell/channelCurve';

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
  /** How the picture lies on the sky. */
  seen: SeenSky;
  frame: string;
  velocityOf: (channel: number) => number;
  order: StripOrder;
  channel: number;
  channelWidth: number;
  /** The picture is a map of all channels: no marks lie on it, and the model shows its widest ring. */
  allChannels: boolean;
  marks: readonly PlacedMark[];
  selected: readonly PlacedMark[];
  readings: readonly ChannelReading[];
  model: SceneModel | null;
  beam: Beam | null;
  grid: Grid;
  notation: Notation;
  /** Of the shell, for the scale bar; null: not known. */
  distancePc: number | null;
  contours?: Scene['contours'];
  layers?: Scene['layers'];
}

/** What lies over the map, in image pixels; every ring is a circle on the sky, drawn where the projection puts it. */
export function useScene(input: SceneInput): Scene {
  const { seen, order, channel, channelWidth, marks, selected, readings, model, beam, grid, notation } =
    input;
  const { allChannels, frame, distancePc, contours, layers, velocityOf } = input;
  const { sky, nx, ny, lie, reach, fromImage } = seen;
  const jump = Math.max(nx, ny) / 2;
  const galactic = useMemo<Project>(
    () =>
      ({ lon, lat }) =>
        sky.galacticToPixel(lon, lat),
    [sky],
  );
  const isPolar = lie === 'polar' || lie === 'stacked';

  const lines = useMemo(() => {
    if (grid === 'off') return null;
    if (isPolar)
      return (v: Viewport) =>
        lie === 'stacked' && model
          ? polarLines(v, reach / model.theta, ' ring radii')
          : polarLines(v, reach, '°');
    const mapping = skyMapping(sky, frame, grid);
    const style = notation === 'decimal' ? 'decimal' : grid === 'equatorial' ? 'hours' : 'sexagesimal';
    return keptWhileStill((v: Viewport) => graticule(v, mapping, style));
  }, [sky, frame, grid, notation, isPolar, lie, reach, model]);

  const furniture = useMemo(() => {
    if (isPolar) return null;
    const mapping = skyMapping(sky, frame, grid === 'off' ? 'galactic' : grid);
    return keptWhileStill((v: Viewport) => furnitureOf(v, mapping, distancePc));
  }, [sky, frame, grid, isPolar, distancePc]);

  const outline = useMemo(() => {
    const at = isPolar ? null : sky.pixelToSky((nx - 1) / 2, (ny - 1) / 2);
    return beam && at ? beamOutline(beam, at, ({ lon, lat }) => sky.skyToPixel(lon, lat)) : null;
  }, [sky, beam, nx, ny, isPolar]);

  const sceneMarks = useMemo<SceneMark[]>(() => {
    if (allChannels) return [];
    const here = order.positions[channel] ?? 0;
    return marks.flatMap((mark) => {
      const away = (order.positions[mark.channel] ?? Infinity) - here;
      if (Math.abs(away) > NEIGHBOURS) return [];
      const at = fromImage(mark);
      return at ? [{ id: mark.id, ...at, away, selected: selected.includes(mark), unsure: mark.unsure }] : [];
    });
  }, [marks, order, channel, selected, allChannels, fromImage]);

  const velocity = velocityOf(channel);
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
    () => ({
      graticule: lines,
      marks: sceneMarks,
      modelRing,
      ownRing,
      centre,
      beam: outline,
      furniture,
      contours,
      layers,
    }),
    [lines, sceneMarks, modelRing, ownRing, centre, outline, furniture, contours, layers],
  );
}

/** Lines cost some thousand coordinate transformations: as long as the map stands still they are worked out once. */
function keptWhileStill<T>(make: (v: Viewport) => T): (v: Viewport) => T {
  let last: { v: Viewport; made: T } | null = null;
  return (v) => {
    if (last?.v !== v) last = { v, made: make(v) };
    return last.made;
  };
}
