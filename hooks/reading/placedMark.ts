import type { Mark } from '@/shared/contract/readings';

/** A rim mark with an identity: what the screen selects, moves and merges. */
export interface PlacedMark {
  id: string;
  channel: number;
  x: number;
  y: number;
  sigma?: number;
}

/** Marks as they come from the server; one that came without an identity (through a script) takes one from its place. */
export function placed(marks: readonly Mark[]): PlacedMark[] {
  const used = new Set(marks.map((m) => m.id));
  return marks.map((mark, i) => {
    if (mark.id) return { ...mark, id: mark.id };
    let id = `p${mark.channel}-${mark.x.toFixed(2)}-${mark.y.toFixed(2)}`.slice(0, 32);
    if (used.has(id)) id = `${id}-${i}`;
    used.add(id);
    return { ...mark, id };
  });
}

export const sameMark = (a: PlacedMark, b: PlacedMark): boolean =>
  a.id === b.id && a.channel === b.channel && a.x === b.x && a.y === b.y && a.sigma === b.sigma;

/** The same marks, in whatever order. */
export function sameMarks(a: readonly PlacedMark[], b: readonly PlacedMark[]): boolean {
  if (a.length !== b.length) return false;
  const byId = new Map(a.map((mark) => [mark.id, mark]));
  return b.every((mark) => {
    const other = byId.get(mark.id);
    return other !== undefined && sameMark(other, mark);
  });
}

/** All marks of both sides; where both have one, `mine` says where it is. */
export function union(mine: readonly PlacedMark[], stored: readonly PlacedMark[]): PlacedMark[] {
  const ids = new Set(mine.map((mark) => mark.id));
  return [...mine, ...stored.filter((mark) => !ids.has(mark.id))];
}

/** A new identity; unique in practice within one reading (62 random bits). */
export const newMarkId = (random: () => number = Math.random): string =>
  Array.from({ length: 12 }, () => Math.floor(random() * 36).toString(36)).join('');
