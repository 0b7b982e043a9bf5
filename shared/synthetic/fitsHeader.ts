/** One card: a value, and what it is. */
export interface HeaderEntry {
  keyword: string;
  value: string | number | boolean;
  comment?: string;
}

const CARD = 80;
const BLOCK = 2880;

/**
 * A FITS header as bytes, padded to whole blocks (FITS standard 4.0, sections 3.3 and 4.2: numbers and logicals end in
 * column 30 where they fit, text begins in column 11).
 *
 * @throws RangeError for a keyword or a text that does not fit a card, and for a number that is not finite
 */
export function fitsHeader(entries: readonly HeaderEntry[]): Uint8Array<ArrayBuffer> {
  const text = [...entries.map(card), 'END'.padEnd(CARD)].join('');
  const bytes = new Uint8Array(padded(text.length)).fill(0x20);
  for (let i = 0; i < text.length; i++) bytes[i] = text.charCodeAt(i);
  return bytes;
}

/** A length brought up to whole blocks. */
export const padded = (bytes: number): number => Math.ceil(bytes / BLOCK) * BLOCK;

function card({ keyword, value, comment }: HeaderEntry): string {
  const text = keyword.padEnd(8) + (keyword === 'COMMENT' ? ` ${value}` : `= ${written(value)}`);
  if (!/^[A-Z0-9_-]{1,8}$/.test(keyword) || text.length > CARD || !/^[ -~]*$/.test(text))
    throw new RangeError(`${keyword} does not fit a card`);
  const remark = comment === undefined || keyword === 'COMMENT' ? '' : ` / ${comment}`;
  return (text + remark).slice(0, CARD).padEnd(CARD);
}

function written(value: string | number | boolean): string {
  if (typeof value === 'boolean') return (value ? 'T' : 'F').padStart(20);
  if (typeof value === 'string') return `'${value.replaceAll("'", "''").padEnd(8)}'`.padEnd(20);
  if (!Number.isFinite(value)) throw new RangeError(`${value} cannot be written`);
  return String(value).toUpperCase().padStart(20);
}
