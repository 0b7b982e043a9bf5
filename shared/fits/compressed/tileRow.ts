import { Problem } from '@/shared/contract/problem';
import type { TableColumn, TileColumn, TiledImage } from './tiledImage';

/** Bytes of the heap that belong to a tile, counted from where the heap begins. */
export interface HeapSlice {
  offset: number;
  length: number;
  elementBytes: number;
}

/** What the table says of one tile. */
export interface TileRow {
  /** Which of the three columns the pixels are in. */
  from: 'COMPRESSED_DATA' | 'GZIP_COMPRESSED_DATA' | 'UNCOMPRESSED_DATA';
  slice: HeapSlice;
  /** null where the tile is not quantised. */
  scale: number | null;
  zero: number;
  blank: number | null;
}

/**
 * Read one row of the table of a tile-compressed image.
 *
 * @param row   rowBytes bytes
 * @param index which row, for the message
 * @throws Problem compressed-damaged when the row names no bytes, or bytes outside the heap
 */
export function tileRow(image: TiledImage, row: Uint8Array, index: number): TileRow {
  const view = new DataView(row.buffer, row.byteOffset, row.byteLength);
  const { columns } = image;
  const number = (name: TileColumn) => (columns[name] ? numberAt(view, columns[name]) : null);
  for (const from of ['COMPRESSED_DATA', 'GZIP_COMPRESSED_DATA', 'UNCOMPRESSED_DATA'] as const) {
    const column = columns[from];
    if (!column) continue;
    const slice = sliceAt(view, column);
    if (slice.length === 0) continue;
    if (!(slice.length > 0 && slice.offset >= 0 && slice.offset + slice.length <= image.heapBytes))
      throw new Problem(
        'compressed-damaged',
        `Row ${index + 1} of the compressed image names bytes outside its data.`,
      );
    return {
      from,
      slice,
      scale: number('ZSCALE') ?? image.scale,
      zero: number('ZZERO') ?? image.zero ?? 0,
      blank: number('ZBLANK') ?? image.blank,
    };
  }
  throw new Problem('compressed-damaged', `Row ${index + 1} of the compressed image holds no pixels.`);
}

function sliceAt(view: DataView, { offset, kind, elementBytes }: TableColumn): HeapSlice {
  const wide = kind === 'Q';
  const count = wide ? Number(view.getBigInt64(offset)) : view.getInt32(offset);
  const start = wide ? Number(view.getBigInt64(offset + 8)) : view.getInt32(offset + 4);
  return { offset: start, length: count * elementBytes, elementBytes };
}

function numberAt(view: DataView, { offset, kind }: TableColumn): number | null {
  switch (kind) {
    case 'B':
      return view.getUint8(offset);
    case 'I':
      return view.getInt16(offset);
    case 'J':
      return view.getInt32(offset);
    case 'K':
      return Number(view.getBigInt64(offset));
    case 'E':
      return view.getFloat32(offset);
    case 'D':
      return view.getFloat64(offset);
    default:
      return null;
  }
}
