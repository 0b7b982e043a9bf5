import { Problem } from '@/shared/contract/problem';
import { axisLengths, required } from '../cubeAxes';
import type { Header } from '../header';

/** How the pixels of a tile-compressed image are laid out in its table: plain JSON. */
export interface TiledImage {
  algorithm: 'RICE_1' | 'GZIP_1' | 'GZIP_2' | 'NOCOMPRESS';
  bitpix: 8 | 16 | 32 | 64 | -32 | -64;
  naxis: number[];
  /** Lengths of a whole tile; tiles at the far edges may be shorter. */
  tile: number[];
  /** Bytes of a row, rows (one a tile), and bytes from the start of the table to the heap. */
  rowBytes: number;
  rows: number;
  heapOffset: number;
  heapBytes: number;
  columns: Partial<Record<TileColumn, TableColumn>>;
  rice: { blockSize: number; bytesPerPixel: 1 | 2 | 4 };
  dither: 'none' | 'subtractive1' | 'subtractive2';
  /** Seed of the first tile, 1 … 10000. */
  ditherSeed: number;
  /** Of keywords, for all tiles; null where a column or nothing says it. */
  scale: number | null;
  zero: number | null;
  blank: number | null;
}

export type TileColumn =
  'COMPRESSED_DATA' | 'GZIP_COMPRESSED_DATA' | 'UNCOMPRESSED_DATA' | 'ZSCALE' | 'ZZERO' | 'ZBLANK';

export interface TableColumn {
  /** Bytes from the start of a row. */
  offset: number;
  /** P, Q: descriptor of an array in the heap; else the type of the number itself. */
  kind: 'P' | 'Q' | 'B' | 'I' | 'J' | 'K' | 'E' | 'D';
  /** Bytes of an element of the array that a descriptor names. */
  elementBytes: number;
}

/** Most pixels of a tile: its integers and its pixels are in memory together. */
export const MAX_TILE_PIXELS = 2 ** 23;
const BYTES: Record<string, number> = {
  L: 1,
  B: 1,
  A: 1,
  I: 2,
  J: 4,
  E: 4,
  K: 8,
  D: 8,
  C: 8,
  M: 16,
  P: 8,
  Q: 16,
};
const NAMES: TileColumn[] = [
  'COMPRESSED_DATA',
  'GZIP_COMPRESSED_DATA',
  'UNCOMPRESSED_DATA',
  'ZSCALE',
  'ZZERO',
  'ZBLANK',
];
const DITHERS: Record<string, TiledImage['dither']> = {
  NONE: 'none',
  NO_DITHER: 'none',
  SUBTRACTIVE_DITHER_1: 'subtractive1',
  SUBTRACTIVE_DITHER_2: 'subtractive2',
};

/**
 * What the header of a tile-compressed image says of its tiles (FITS Standard 4.0, section 10.1).
 *
 * @throws Problem fits-card naming the card; fits-shape for an algorithm that is not read
 */
export function tiledImage(header: Header): TiledImage {
  const algorithm = algorithmOf(header);
  const bitpix = required(header, 'ZBITPIX');
  if (![8, 16, 32, 64, -32, -64].includes(bitpix))
    throw bad('ZBITPIX', `ZBITPIX must be 8, 16, 32, 64, -32 or -64; the header says ${bitpix}.`);
  const naxis = axisLengths(header, 'Z');
  const tile = tileOf(header, naxis);
  const [rowBytes, rows] = [required(header, 'NAXIS1'), required(header, 'NAXIS2')];
  const tiles = naxis.reduce((product, n, i) => product * Math.ceil(n / tile[i]!), 1);
  if (naxis.length > 0 && !naxis.includes(0) && rows !== tiles)
    throw bad('NAXIS2', `The image has ${tiles} tiles (ZNAXISn, ZTILEn), and the table ${rows} rows.`);
  const heapOffset = header.integer('THEAP') ?? rowBytes * rows;
  const heapBytes = rowBytes * rows + (header.integer('PCOUNT') ?? 0) - heapOffset;
  if (heapOffset < rowBytes * rows || heapBytes < 0)
    throw bad('THEAP', 'The heap of the compressed tiles begins inside the table or beyond its end.');
  return {
    algorithm,
    bitpix: bitpix as TiledImage['bitpix'],
    naxis,
    tile,
    rowBytes,
    rows,
    heapOffset,
    heapBytes,
    columns: columnsOf(header, rowBytes),
    rice: riceOf(header),
    ...ditherOf(header),
    scale: header.number('ZSCALE'),
    zero: header.number('ZZERO'),
    blank: header.integer('ZBLANK') ?? (bitpix > 0 ? null : header.integer('BLANK')),
  };
}

function algorithmOf(header: Header): TiledImage['algorithm'] {
  const name = header.text('ZCMPTYPE')?.toUpperCase() ?? null;
  switch (name) {
    case 'RICE_1':
    case 'RICE_ONE':
      return 'RICE_1';
    case 'GZIP_1':
    case 'GZIP_2':
    case 'NOCOMPRESS':
      return name;
    case null:
      throw bad('ZCMPTYPE', 'The header has no ZCMPTYPE card: the compression of the image is not known.');
    default:
      throw new Problem(
        'fits-shape',
        `The image is compressed with ${name}, which is not read: expand it first (for example with funpack) and send the result.`,
        { card: 'ZCMPTYPE' },
      );
  }
}

/** Tiles are rows of the image unless ZTILEn say otherwise. */
function tileOf(header: Header, naxis: number[]): number[] {
  const tile = naxis.map((n, i) => Math.min(header.integer(`ZTILE${i + 1}`) ?? (i === 0 ? n : 1), n));
  const wrong = tile.findIndex((t, i) => t < 1 && naxis[i]! > 0);
  if (wrong >= 0)
    throw bad(`ZTILE${wrong + 1}`, `ZTILE${wrong + 1} = ${tile[wrong]} is no length of a tile.`);
  const pixels = tile.reduce((product, t) => product * t, 1);
  if (pixels > MAX_TILE_PIXELS)
    throw bad(
      'ZTILE1',
      `A tile has ${pixels} pixels, more than ${MAX_TILE_PIXELS}, the most that are read: expand the image first (for example with funpack).`,
    );
  return tile;
}

function columnsOf(header: Header, rowBytes: number): TiledImage['columns'] {
  const columns: TiledImage['columns'] = {};
  const fields = required(header, 'TFIELDS');
  let offset = 0;
  for (let i = 1; i <= Math.min(fields, 999); i++) {
    const form = /^(\d*)([LXBAIJKEDCMPQ])([A-Z]?)/.exec((header.text(`TFORM${i}`) ?? '').toUpperCase());
    if (!form) throw bad(`TFORM${i}`, `TFORM${i} is missing or names no kind of column.`);
    const [, repeat, kind, element] = form as unknown as [string, string, string, string];
    const count = repeat === '' ? 1 : Number(repeat);
    const name = header.text(`TTYPE${i}`)?.toUpperCase() as TileColumn | undefined;
    if (name && NAMES.includes(name) && count === 1 && /[PQBIJKED]/.test(kind))
      columns[name] ??= { offset, kind: kind as TableColumn['kind'], elementBytes: BYTES[element] ?? 1 };
    offset += kind === 'X' ? Math.ceil(count / 8) : count * BYTES[kind]!;
  }
  if (offset > rowBytes)
    throw bad('NAXIS1', `The columns of the table need ${offset} bytes a row, not ${rowBytes}.`);
  for (const name of NAMES.slice(0, 3)) {
    if (columns[name] && !/[PQ]/.test(columns[name].kind))
      throw bad('TFORM1', `The column ${name} must hold arrays of any length.`);
  }
  if (!columns.COMPRESSED_DATA) throw bad('TTYPE1', 'The table has no column COMPRESSED_DATA.');
  return columns;
}

function riceOf(header: Header): TiledImage['rice'] {
  const rice = { blockSize: 32, bytesPerPixel: 4 };
  for (let i = 1; header.has(`ZNAME${i}`); i++) {
    const name = header.text(`ZNAME${i}`)?.toUpperCase();
    if (name === 'BLOCKSIZE') rice.blockSize = required(header, `ZVAL${i}`);
    if (name === 'BYTEPIX') rice.bytesPerPixel = required(header, `ZVAL${i}`);
  }
  if (![1, 2, 4].includes(rice.bytesPerPixel) || rice.blockSize < 1 || rice.blockSize > 65536)
    throw bad(
      'ZVAL1',
      `Rice compression with ${rice.bytesPerPixel} bytes a pixel in blocks of ${rice.blockSize} is not read.`,
    );
  return rice as TiledImage['rice'];
}

function ditherOf(header: Header): Pick<TiledImage, 'dither' | 'ditherSeed'> {
  const name = (header.text('ZQUANTIZ') ?? 'NO_DITHER').toUpperCase();
  if (!Object.hasOwn(DITHERS, name)) throw bad('ZQUANTIZ', `ZQUANTIZ = '${name}' is no method that is read.`);
  const seed = header.integer('ZDITHER0') ?? 1;
  if (DITHERS[name] !== 'none' && (seed < 1 || seed > 10000))
    throw bad('ZDITHER0', `ZDITHER0 must be 1 to 10000; the header says ${seed}.`);
  return { dither: DITHERS[name]!, ditherSeed: seed };
}

const bad = (card: string, detail: string) => new Problem('fits-card', detail, { card });
