import { Header } from '../header';
import { BLOCK, headerText } from '../headerScan';

const CARD = 80;
/** Cards that say how an HDU is stored, not what the image is. */
const STORAGE = /^(SIMPLE|XTENSION|BITPIX|NAXIS\d*|EXTEND|PCOUNT|GCOUNT|GROUPS|CHECKSUM|DATASUM)$/;
/** Cards that say how a tile-compressed image is stored in its table (FITS Standard 4.0, sections 7.3 and 10.1). */
const TABLE =
  /^(TFIELDS|THEAP|T(TYPE|FORM|UNIT|NULL|SCAL|ZERO|DISP|DIM|BCOL)\d+|ZIMAGE|ZCMPTYPE|ZBITPIX|ZNAXIS\d*|ZTILE\d+|ZNAME\d+|ZVAL\d+|ZMASKCMP|ZQUANTIZ|ZDITHER0|ZSCALE|ZZERO|ZBLANK|ZSIMPLE|ZTENSION|ZEXTEND|ZBLOCKED|ZPCOUNT|ZGCOUNT|ZHECKSUM|ZDATASUM)$/;

/**
 * The header of an image HDU as it would stand in a plain file with that image alone: as a primary header, with the
 * cards of the storage (extension, checksums, the table of a tile-compressed image) taken out.
 *
 * @param bytes whole blocks of the header of an image, or of a table that holds a tile-compressed image
 * @returns whole blocks, END included
 */
export function plainImageHeader(bytes: Uint8Array): Uint8Array {
  const header = new Header(bytes);
  const tiled = header.logical('ZIMAGE') === true;
  const prefix = tiled ? 'Z' : '';
  const count = header.integer(`${prefix}NAXIS`) ?? 0;
  const cards = [
    card('SIMPLE', 'T'),
    card('BITPIX', header.integer(`${prefix}BITPIX`) ?? 0),
    card('NAXIS', count),
  ];
  for (let i = 1; i <= Math.min(count, 999); i++)
    cards.push(card(`NAXIS${i}`, header.integer(`${prefix}NAXIS${i}`) ?? 0));
  const blank = header.wideInteger('ZBLANK');
  if (tiled && blank !== null && !header.has('BLANK') && (header.integer('ZBITPIX') ?? 0) > 0)
    cards.push(card('BLANK', blank));
  cards.push(...keptCards(bytes, tiled), 'END'.padEnd(CARD));
  const text = cards.join('');
  const plain = new Uint8Array(Math.ceil(text.length / BLOCK) * BLOCK).fill(0x20);
  for (let i = 0; i < text.length; i++) plain[i] = text.charCodeAt(i) & 0xff;
  return plain;
}

function keptCards(bytes: Uint8Array, tiled: boolean): string[] {
  // Bytes outside ASCII stay as they are, so that the plain copy is read with the same caution.
  const shown = headerText(bytes);
  const kept: string[] = [];
  let dropping = false;
  for (let at = 0; at + CARD <= bytes.length; at += CARD) {
    const text = shown.slice(at, at + CARD);
    const keyword = text.slice(0, 8).trimEnd();
    if (keyword === 'END' && text.trimEnd() === 'END') break;
    if (keyword !== 'CONTINUE')
      dropping =
        STORAGE.test(keyword) ||
        (tiled && (TABLE.test(keyword) || /^EXTNAME = 'COMPRESSED_IMAGE'/.test(text)));
    if (!dropping) kept.push(String.fromCharCode(...bytes.subarray(at, at + CARD)));
  }
  return kept;
}

const card = (keyword: string, value: number | bigint | string) =>
  `${keyword.padEnd(8)}= ${String(value).padStart(20)}`.padEnd(CARD);
