import { sliceOfText, sliceText, type Slice } from '@/components/slices/slice';
import type { MapKind } from '@/shared/contract/cubes';
import type { LonLat } from '@/shared/sky/greatCircle';

/** How the sky lies in the picture. */
export const LIES = ['image', 'stereographic', 'polar', 'stacked'] as const;
export type Lie = (typeof LIES)[number];

/** What is to be seen besides one channel as it is: part of the address. Angles in arcminutes. */
export interface Seeing {
  /** Channels averaged into one; 1: none. */
  mean: number;
  /** Smoothed to this beam. */
  beam: number | null;
  /** Less a smoothing to this width. */
  less: number | null;
  /** What is flicked to, and what a difference is taken with: a channel, or the model. */
  other: number | 'model' | null;
  /** Show the difference with the other channel. */
  minus: boolean;
  lie: Lie;
  /** What a view other than the image is about: galactic centre, and how far it reaches, degrees. */
  about: (LonLat & { reach: number }) | null;
  /** On a second map, where there is room: a map of all channels, or the other channel. */
  second: MapKind | 'other' | null;
  /** Contours of a map of a cube of the region, or of a companion image. */
  contours: ContourChoice | null;
  /** What is cut through velocity. */
  slice: Slice | null;
  /** What else lies over the map. */
  layers: readonly LayerName[];
  /** The fit whose frozen marks are shown. */
  marksOf: string | null;
}

/** Layers that are shown or not: the rim traced from the brightness, the rings of the region's other shells. */
export const LAYERS = ['traced', 'shells'] as const;
export type LayerName = (typeof LAYERS)[number];

export type ContourKind = MapKind | 'image';
export interface ContourChoice {
  /** The cube or the image. */
  of: string;
  kind: ContourKind;
  count: number;
  /** Lowest and highest level; null: as the map suggests. */
  ends: readonly [number, number] | null;
}

export const MAPS: readonly MapKind[] = ['total', 'peak', 'velocity', 'dispersion'];
export const MOST_LEVELS = 12;

export const AS_IS: Seeing = {
  mean: 1,
  beam: null,
  less: null,
  other: null,
  minus: false,
  lie: 'image',
  about: null,
  second: null,
  contours: null,
  slice: null,
  layers: [],
  marksOf: null,
};

/** Most channels that are averaged. */
export const MOST_MEAN = 25;

const UUID = /^[0-9a-f-]{36}$/i;

type Params = Record<string, string | string[] | undefined>;

/** Read an address; what does not make sense there is as if it were not given. */
export function seeingOf(params: Params): Seeing {
  const text = (name: string) => {
    const value = params[name];
    return (Array.isArray(value) ? value[0] : value) || null;
  };
  const number = (name: string, low: number, high: number) => {
    const value = text(name) === null ? NaN : Number(text(name));
    return value >= low && value <= high ? value : null;
  };
  const mean = number('mean', 1, MOST_MEAN);
  const other = text('other') === 'model' ? 'model' : number('other', 0, 1e6);
  const [lon, lat, reach] = (text('about') ?? '').split(',').map(Number);
  const about =
    lon !== undefined &&
    lat !== undefined &&
    reach !== undefined &&
    Math.abs(lat) <= 90 &&
    reach > 0 &&
    reach <= 170
      ? { lon, lat, reach }
      : null;
  const lie = (about && LIES.find((l) => l === text('view'))) ?? 'image';
  return {
    mean: mean === null ? 1 : 2 * Math.floor(mean / 2) + 1,
    beam: number('beam', 1e-3, 6000),
    less: number('less', 1e-3, 6000),
    other: typeof other === 'number' ? Math.floor(other) : other,
    minus: typeof other === 'number' && text('minus') === '1',
    lie,
    about: lie === 'image' ? null : about,
    second: (['other', ...MAPS] as const).find((m) => m === text('second')) ?? null,
    contours: contoursOfText(text('contours')),
    slice: sliceOfText(text('cut')),
    layers: LAYERS.filter((name) => text('layers')?.split(',').includes(name)),
    marksOf: UUID.test(text('marksof') ?? '') ? text('marksof') : null,
  };
}

function contoursOfText(text: string | null): ContourChoice | null {
  const [of, kindName, countText, lowText, highText] = (text ?? '').split(',');
  const kind = ([...MAPS, 'image'] as const).find((m) => m === kindName);
  const count = Number(countText);
  if (!of || !UUID.test(of) || !kind || !(count >= 1 && count <= MOST_LEVELS)) return null;
  const [low, high] = [Number(lowText), Number(highText)];
  return {
    of,
    kind,
    count: Math.floor(count),
    ends: lowText && highText && low < high ? [low, high] : null,
  };
}

const short = (value: number, digits: number) => String(Number(value.toPrecision(digits)));

/** The address of what is seen; what is as usual is left out. */
export function paramsOfSeeing(s: Seeing): Record<string, string | undefined> {
  const { about, contours } = s;
  return {
    mean: s.mean > 1 ? String(s.mean) : undefined,
    beam: s.beam === null ? undefined : short(s.beam, 4),
    less: s.less === null ? undefined : short(s.less, 4),
    other: s.other === null ? undefined : String(s.other),
    minus: s.minus ? '1' : undefined,
    view: s.lie === 'image' ? undefined : s.lie,
    about:
      about && s.lie !== 'image'
        ? [short(about.lon, 7), short(about.lat, 7), short(about.reach, 4)].join(',')
        : undefined,
    cut: sliceText(s.slice),
    layers: s.layers.length > 0 ? s.layers.join(',') : undefined,
    marksof: s.marksOf ?? undefined,
    second: s.second ?? undefined,
    contours: contours
      ? [
          contours.of,
          contours.kind,
          contours.count,
          ...(contours.ends ? contours.ends.map((e) => short(e, 4)) : []),
        ].join(',')
      : undefined,
  };
}

/** An angle in arcminutes as it is said: 4.0′, 1.5°. */
export const angleWords = (arcmin: number): string =>
  arcmin >= 90
    ? `${Number((arcmin / 60).toPrecision(3))}°`
    : `${arcmin < 10 ? arcmin.toFixed(1) : Number(arcmin.toPrecision(3))}′`;

export const LIE_WORDS: Record<Lie, { label: string; said: string | null }> = {
  image: { label: 'As imaged', said: null },
  stereographic: { label: 'Stereographic', said: 'stereographic about the shell’s centre' },
  polar: { label: 'Polar', said: 'azimuth across, distance from the centre down' },
  stacked: { label: 'Stacked', said: 'channels stacked by scaled radius' },
};
