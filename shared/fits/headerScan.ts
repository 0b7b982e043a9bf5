import { Problem } from '@/shared/contract/problem';

/** FITS files come in blocks of this many bytes. */
export const BLOCK = 2880;
const CARD = 80;

/** Longest header that is read: a thousand blocks, 36 000 cards. Real ones have some dozens to some thousands. */
export const MAX_HEADER_BYTES = 1000 * BLOCK;

export type HeaderScan = { status: 'complete'; headerBytes: number } | { status: 'incomplete' };

const BEGINNINGS: [magic: number[], what: string][] = [
  [[0x89, 0x50, 0x4e, 0x47], 'a PNG picture'],
  [[0xff, 0xd8, 0xff], 'a JPEG picture'],
  [[0x50, 0x4b, 0x03, 0x04], 'a zip archive: unpack it and send the FITS file inside'],
  [[0x1f, 0x8b], 'compressed with gzip: expand it first (gunzip) and send the .fits file'],
  [[0x42, 0x5a, 0x68], 'compressed with bzip2: expand it first (bunzip2) and send the .fits file'],
  [[0xfd, 0x37, 0x7a, 0x58], 'compressed with xz: expand it first (unxz) and send the .fits file'],
  [[0x89, 0x48, 0x44, 0x46], 'an HDF5 file'],
  [[0x25, 0x50, 0x44, 0x46], 'a PDF document'],
];

/**
 * Look for the end of a header in the first bytes of a file (or of an extension), so that a header can be judged
 * as soon as it has arrived.
 *
 * @param bytes from the first byte of the header on; more may follow later
 * @param kind  what must stand there: the primary header (SIMPLE) or an extension's (XTENSION)
 * @returns complete with the length of the header in bytes, a multiple of 2880; or incomplete: call again with more
 * @throws Problem not-fits as soon as the bytes cannot begin a FITS header; fits-card (END) when the header runs
 *         into binary data or beyond MAX_HEADER_BYTES
 */
export function scanHeader(bytes: Uint8Array, kind: 'primary' | 'extension' = 'primary'): HeaderScan {
  requireStart(bytes, kind === 'primary' ? 'SIMPLE  =' : 'XTENSION=');
  for (let start = 0; start + BLOCK <= bytes.length; start += BLOCK) {
    if (start >= MAX_HEADER_BYTES) {
      throw new Problem(
        'fits-card',
        `The header has more than ${MAX_HEADER_BYTES / CARD} cards, the most that are read. Remove HISTORY cards that are not needed.`,
        { card: 'END' },
      );
    }
    for (let at = start; at < start + BLOCK; at += CARD) {
      if (isEnd(bytes, at)) return { status: 'complete', headerBytes: start + BLOCK };
    }
    if (bytes.subarray(start, start + BLOCK).includes(0)) {
      throw new Problem('fits-card', 'The header runs into the data: it has no END card.', { card: 'END' });
    }
  }
  return { status: 'incomplete' };
}

/** Characters of a header; bytes that are no printable ASCII become U+FFFD, which every screen shows harmlessly. */
export function headerText(bytes: Uint8Array): string {
  const parts: string[] = [];
  for (let at = 0; at < bytes.length; at += CARD) {
    const codes = Array.from(bytes.subarray(at, at + CARD), (b) => (b >= 32 && b < 127 ? b : 0xfffd));
    parts.push(String.fromCharCode(...codes));
  }
  return parts.join('');
}

function isEnd(bytes: Uint8Array, at: number): boolean {
  if (bytes[at] !== 0x45 || bytes[at + 1] !== 0x4e || bytes[at + 2] !== 0x44) return false;
  for (let i = at + 3; i < at + CARD; i++) if (bytes[i] !== 0x20) return false;
  return true;
}

function requireStart(bytes: Uint8Array, start: string): void {
  const length = Math.min(bytes.length, start.length);
  for (let i = 0; i < length; i++) {
    if (bytes[i] !== start.charCodeAt(i)) {
      throw new Problem('not-fits', `A FITS file begins with "${start}"; this is ${describe(bytes)}.`);
    }
  }
}

/** What the file seems to be instead, for the message. */
function describe(bytes: Uint8Array): string {
  const known = BEGINNINGS.find(([magic]) => magic.every((b, i) => bytes[i] === b));
  if (known) return known[1];
  const head = String.fromCharCode(...bytes.subarray(0, 400));
  if (/^\s*<(!doctype|html|\?xml)/i.test(head)) return 'a web page or XML document';
  if (head.startsWith('XTENSION')) return 'a FITS extension without the primary header before it';
  if (/^[\x09\x0a\x0d\x20-\x7e]*$/.test(head)) return 'plain text';
  return 'something else';
}
