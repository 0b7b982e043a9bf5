import type { MapKind } from '@/shared/contract/cubes';
import { VIEW_ORDER } from '@/components/cube/views';
import { paramsOfSeeing, seeingOf, type Seeing } from '@/components/seeing/seeing';
import { PALETTES, type Palette } from '@/shared/image/palettes';
import { TONES, type Tone } from '@/shared/image/tone';

/** What the address of a cube carries, so that a link shows a colleague the same thing. */
export interface CubePlace {
  channel: number | null;
  shell: string | null;
  /** A map of all channels in the channel's place. */
  map: MapKind | null;
  /** The image point in the middle of the map; zoom 1 fits the image. Null: the whole image. */
  view: { x: number; y: number; zoom: number } | null;
  /** A mark of the reading, by its number in the list. */
  mark: number | null;
  palette: Palette | null;
  tone: Tone | null;
  window: readonly [number, number] | null;
  /** What is seen besides the channel as it is. */
  seeing: Seeing;
}

export type AddressParams = Record<string, string | undefined>;

/** Read an address; whatever does not make sense there is as if it were not given. */
export function placeOf(params: Record<string, string | string[] | undefined>): CubePlace {
  const text = (name: string) => {
    const value = params[name];
    return (Array.isArray(value) ? value[0] : value) || null;
  };
  const number = (name: string) => {
    const value = text(name);
    return value !== null && Number.isFinite(Number(value)) ? Number(value) : null;
  };
  const count = (name: string) => {
    const value = number(name);
    return value !== null && Number.isInteger(value) && value >= 0 ? value : null;
  };
  const [x, y, zoom] = [number('x'), number('y'), number('zoom')];
  const [low, high] = [number('low'), number('high')];
  const palette = PALETTES.find((p) => p.toLowerCase() === text('palette')?.toLowerCase());
  return {
    channel: count('ch'),
    shell: text('shell'),
    map: VIEW_ORDER.find((v): v is MapKind => v !== 'channel' && v === text('map')) ?? null,
    view: x !== null && y !== null && zoom !== null && zoom > 0 ? { x, y, zoom } : null,
    mark: count('mark'),
    palette: palette ?? null,
    tone: TONES.find((t) => t === text('tone')) ?? null,
    window: low !== null && high !== null && low < high ? [low, high] : null,
    seeing: seeingOf(params),
  };
}

const short = (value: number, digits: number) => String(Number(value.toPrecision(digits)));

/** The address of a place; what is as usual is left out (undefined takes a parameter away). */
export function paramsOf(place: CubePlace): AddressParams {
  const { view, window } = place;
  const moved = view !== null && (Math.abs(view.zoom - 1) > 1e-3 || view.zoom > 1);
  return {
    ch: place.channel === null ? undefined : String(place.channel),
    shell: place.shell ?? undefined,
    map: place.map ?? undefined,
    zoom: moved ? short(view.zoom, 4) : undefined,
    x: moved ? short(view.x, 6) : undefined,
    y: moved ? short(view.y, 6) : undefined,
    mark: place.mark === null ? undefined : String(place.mark),
    palette: place.palette ?? undefined,
    tone: place.tone ?? undefined,
    low: window ? short(window[0], 5) : undefined,
    high: window ? short(window[1], 5) : undefined,
    ...paramsOfSeeing(place.seeing),
  };
}
