import type { Columns } from '@/shared/image/figure/figure';

export type Kind = 'picture' | 'sheet' | 'loop';
export interface Choices {
  kind: Kind;
  columns: Columns;
  ground: 'paper' | 'dome';
  /** The part of the image on the map, or all of it. */
  part: 'seen' | 'whole';
  /** Of a sheet: channels with marks, or channels evenly spread. */
  pick: 'marked' | 'even';
  /** Of a sheet with channels evenly spread. */
  count: number;
  /** Of a loop: there and back again. */
  back: boolean;
  withCaption: boolean;
  caption: string;
}

/** Most channels of a sheet: more would be stamps. */
export const MOST_PANELS = 24;
export const PANEL_COUNTS = [4, 6, 8, 9, 12, 16, 20, 24] as const;
/** Most pictures of a loop, counted one way; of a longer run every second or third channel is taken. */
export const MOST_FRAMES = 64;

/** `count` of a row of things, evenly from the first to the last. */
export function evenly<T>(list: readonly T[], count: number): T[] {
  if (count >= list.length) return [...list];
  if (count <= 1) return list.length > 0 ? [list[list.length >> 1]!] : [];
  return Array.from({ length: count }, (_, i) => list[Math.round((i * (list.length - 1)) / (count - 1))]!);
}

/** A run there and back, without its ends twice. */
export const thereAndBack = <T>(list: readonly T[]): T[] => [...list, ...list.slice(1, -1).reverse()];

/** Pictures in a row of a sheet, so that rows are full where they can be and pictures not too small. */
export function inARow(panels: number, columns: Columns): number {
  const most = columns === 1 ? 3 : 5;
  const least = columns === 1 ? 2 : 3;
  if (panels <= least) return Math.max(panels, 1);
  for (let n = most; n >= least; n--) if (panels % n === 0) return n;
  return most - 1;
}

/** A file's name out of what it shows: letters, digits and dashes. */
export const fileName = (parts: readonly string[], ending: string): string =>
  `${parts
    .join(' ')
    .replace(/−/g, '-')
    .normalize('NFKD')
    .replace(/[^A-Za-z0-9.+-]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 100)}.${ending}`;
