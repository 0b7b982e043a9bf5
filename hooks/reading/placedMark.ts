import type { Mark } from '@/shared/contract/readings';

/** A rim mark with an identity: what the screen selects, moves and merges. */
export type PlacedMark = Mark & { id: string };

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
  a.id === b.id &&
  a.channel === b.channel &&
  a.x === b.x &&
  a.y === b.y &&
  a.sigma === b.sigma &&
  a.unsure === b.unsure &&
  a.note === b.note &&
  a.placed === b.placed;

/** What a person says of a mark besides where it is. An error or a note of null, and unsure of false, take it away. */
export interface MarkSaid {
  sigma?: number | null;
  unsure?: boolean;
  note?: string | null;
}

export function described({ sigma, unsure, note, ...mark }: PlacedMark, said: MarkSaid): PlacedMark {
  const error = said.sigma === undefined ? sigma : (said.sigma ?? undefined);
  const doubt = said.unsure === undefined ? unsure : said.unsure || undefined;
  const text = said.note === undefined ? note : said.note?.trim() || undefined;
  return {
    ...mark,
    ...(error !== undefined && { sigma: error }),
    ...(doubt && { unsure: doubt }),
    ...(text !== undefined && { note: text }),
  };
}

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
