import { useCallback, useMemo } from 'react';
import type { LookControl } from '@/components/cube/useLook';
import { useOwnLook } from '@/components/cube/useOwnLook';
import type { SceneModel } from '@/components/cube/useScene';
import type { OwnKind, ViewControl } from '@/components/cube/useView';
import type { MapStore } from '@/components/map/mapStore';
import { recipeOf, type Seen } from '@/components/seeing/recipe';
import type { Lie, Seeing } from '@/components/seeing/seeing';
import { drawnAhead } from '@/components/seeing/lookAhead';
import { useModelPlane } from '@/components/seeing/useModelPlane';
import { useSeeing, type SeeingControl } from '@/components/seeing/useSeeing';
import { useSeenSky, type SeenSky } from '@/components/seeing/useSeenSky';
import type { StripOrder } from '@/components/strip/stripOrder';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { isPlain, usePicture } from '@/hooks/planes/usePicture';
import { usePlanes, type ChannelPlanes, type Planes } from '@/hooks/planes/usePlanes';
import { useValue } from '@/hooks/valueStore';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import type { Viewport } from '@/shared/image/viewport';
import { footprintOf } from '@/shared/sky/footprint';
import { separation } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

/** How sharp a plane is wanted, in steps of two so that zooming asks rarely. */
const sharpness = (v: Viewport | null): number =>
  v ? 2 ** Math.ceil(Math.log2(Math.max(v.nx, v.ny) * v.scale * (globalThis.devicePixelRatio || 1))) : 512;
/** A stack is made of small planes: there are many. */
const STACK_PX = 256;

export interface SeenPicture {
  seeing: SeeingControl;
  seen: SeenSky;
  /** What was done to the picture, in words, and what could not be. */
  stated: readonly string[];
  refused: readonly string[];
  /** What the map shows. */
  planes: Planes;
  look: LookControl;
  /** Whether that is the look which all channels share. */
  channelsLook: boolean;
  /** The channel as it is. */
  channelPlanes: ChannelPlanes;
  /** Show the sky in another way, about the model's centre or the image's. */
  lieAs: (lie: Lie) => void;
  /** The plane that a step to a channel will show, where that is no more than the plane itself; else null. */
  ahead: (channel: number) => ChannelPlane | null;
}

export interface SeenInput {
  cube: Cube;
  axes: CubeAxes;
  wcs: Wcs;
  order: StripOrder;
  channel: number;
  shownView: ViewControl;
  channelLook: LookControl;
  model: SceneModel | null;
  start: Seeing;
  store: MapStore;
}

/** From what a person wants to see to the picture on the map. */
export function useSeenPicture(input: SeenInput): SeenPicture {
  const { cube, axes, wcs, order, shownView, channelLook, model, store } = input;
  const seeing = useSeeing(input.start);
  const { mean, beam, less, other, minus, lie, about, flicking } = seeing;
  const spec = axes.wcs as unknown as WcsSpec;
  const { nx, ny, channels } = axes;
  const image = useMemo(() => ({ nx, ny, channels }), [nx, ny, channels]);
  const allChannels = shownView.view !== 'channel';
  const seen = useSeenSky(seeing, image, wcs, spec);
  const flicked = flicking && typeof other === 'number' && other < channels && !allChannels;
  const channel = flicked ? other : input.channel;
  const { channelWidth } = axes.spectral;

  const made = useMemo<Seen>(
    () =>
      recipeOf({
        seeing: { mean, beam, less, other, minus: minus && !flicked, lie, about },
        seen,
        channel,
        allChannels,
        order,
        channelWidth,
        image,
        beam: axes.beam,
        wcs,
        model,
      }),
    [
      mean,
      beam,
      less,
      other,
      minus,
      flicked,
      lie,
      about,
      seen,
      channel,
      allChannels,
      order,
      channelWidth,
      image,
      axes.beam,
      wcs,
      model,
    ],
  );
  const sidePx = useValue(store.viewport, sharpness);
  const { sources, minus: taken, stretch } = made.recipe;
  const others = useMemo(() => {
    const all = [...sources, ...taken, ...(typeof other === 'number' && other < channels ? [other] : [])];
    return [...new Set(all)].filter((c) => c !== channel);
  }, [sources, taken, other, channels, channel]);
  const channelPlanes = usePlanes(cube, image, channel, stretch ? STACK_PX : sidePx, others);
  const shown = allChannels ? shownView.planes : channelPlanes;
  const name = `${cube.id} ${cube.readyAt} ${shownView.view}`;
  const picture = usePicture(shown, channelPlanes, made.recipe, spec, name);
  const kind: OwnKind | null =
    less !== null && made.recipe.less
      ? 'less'
      : taken.length > 0
        ? 'difference'
        : allChannels
          ? (shownView.view as OwnKind)
          : null;
  const chosenLook = useOwnLook(kind, picture.plane, channelLook) ?? channelLook;
  const look = useMemo(() => drawnAhead(chosenLook, store.earlyLook), [chosenLook, store]);

  const asModel = flicking && (other === 'model' || other === null) && model !== null && !allChannels;
  const modelPlane = useModelPlane(
    asModel && lie === 'image',
    model,
    image,
    wcs,
    wcs.velocityOf(channel),
    channelWidth,
    axes.beam?.major ?? 0,
    look.window,
  );
  const planes = useMemo(
    () => (modelPlane ? { ...picture, plane: modelPlane } : picture),
    [modelPlane, picture],
  );
  const plain = isPlain(made.recipe) && !allChannels && !modelPlane;
  const { store: planeStore, thumbnail } = channelPlanes;
  const ahead = useCallback(
    (to: number) => (plain ? (planeStore.best(to) ?? thumbnail(to)) : null),
    [plain, planeStore, thumbnail],
  );
  const { setLie } = seeing;
  const lieAs = useCallback(
    (to: Lie) => {
      store.viewport.set(null); // it lies otherwise on the screen
      setLie(to, aboutOf(to, wcs, image, model));
    },
    [setLie, wcs, image, model, store],
  );
  const stated = modelPlane
    ? [`the model, blurred by the beam`]
    : flicked
      ? [`channel ${channel + 1} instead`, ...made.said]
      : made.said;
  return {
    seeing,
    seen,
    stated,
    refused: made.refused,
    planes,
    look,
    channelsLook: chosenLook === channelLook,
    channelPlanes,
    lieAs,
    ahead,
  };
}

/** Farthest a stereographic map reaches: at 180 degrees it would be infinitely large. */
const FARTHEST = 150;
/** Radii of the shell that a polar view reaches. */
const AROUND = 1.7;

/** The centre of a view and how far it reaches: the model's where there is one, else the image's. */
export function aboutOf(
  lie: Lie,
  wcs: Wcs,
  { nx, ny }: { nx: number; ny: number },
  model: SceneModel | null,
): Seeing['about'] {
  const image = footprintOf(wcs, nx, ny);
  if (lie === 'image' || !image) return null;
  const centre = model ? { lon: model.l, lat: model.b } : image.centre;
  const whole = Math.min(image.radius + separation(centre, image.centre), FARTHEST);
  const reach =
    lie === 'stereographic' ? whole : Math.min(model ? AROUND * model.theta : image.radius * 0.7, 90);
  return { ...centre, reach };
}
