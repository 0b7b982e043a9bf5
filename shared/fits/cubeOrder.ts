import type { CubeHead } from './cubeHead';
import { pixelOffset, type CubeLayout } from './planeRange';

/** What reading pixels needs of a head; that of a rewritten copy stands beside the cube. */
export type PixelSource = Pick<
  CubeHead,
  'bitpix' | 'bscale' | 'bzero' | 'blank' | 'dataOffset' | 'dataBytes' | 'layout'
>;

/** Distances between neighbouring pixels in the file, in pixels, and where the first one lies, in bytes. */
export interface Strides {
  x: number;
  y: number;
  channel: number;
  start: number;
}

/** Strides of the three axes, whatever lies between them. */
export function stridesOf(head: CubeLayout): Strides {
  const size = Math.abs(head.bitpix) / 8;
  const start = pixelOffset(head, 0, 0, 0);
  return {
    x: (pixelOffset(head, 1, 0, 0) - start) / size,
    y: (pixelOffset(head, 0, 1, 0) - start) / size,
    channel: (pixelOffset(head, 0, 0, 1) - start) / size,
    start,
  };
}

/** Lengths of the three axes. */
export function shapeOf({ layout }: CubeLayout): { nx: number; ny: number; channels: number } {
  const { naxis, longitude, latitude, spectral } = layout;
  return { nx: naxis[longitude]!, ny: naxis[latitude]!, channels: naxis[spectral]! };
}

/** True when a channel is one run of nothing but its own pixels, row by row or column by column. */
export function isPlaneByPlane(head: CubeLayout): boolean {
  const { nx, ny, channels } = shapeOf(head);
  const { x, y, channel } = stridesOf(head);
  const rows = (nx === 1 || x === 1) && (ny === 1 || y === nx);
  const columns = (ny === 1 || y === 1) && (nx === 1 || x === ny);
  return (rows || columns) && (channels === 1 || channel >= nx * ny);
}

/**
 * How the same pixels lie in a copy that is rewritten plane by plane, from byte 0 on. The sky axis that is the slower
 * one in the file stays the slower one, so that rewriting takes runs and leaves runs.
 */
export function planeByPlane(head: PixelSource): PixelSource {
  const { nx, ny, channels } = shapeOf(head);
  const { x, y } = stridesOf(head);
  const { bitpix, bscale, bzero, blank } = head;
  const rowsSlow = ny === 1 || y >= x;
  return {
    ...{ bitpix, bscale, bzero, blank },
    dataOffset: 0,
    dataBytes: (nx * ny * channels * Math.abs(bitpix)) / 8,
    layout: {
      naxis: rowsSlow ? [nx, ny, channels] : [ny, nx, channels],
      longitude: rowsSlow ? 0 : 1,
      latitude: rowsSlow ? 1 : 0,
      spectral: 2,
    },
  };
}

/** Typed array of the unsigned integers as wide as a pixel: for moving pixels without looking at them. */
export type Words = Uint8Array | Uint16Array | Uint32Array | BigUint64Array;

/** Bytes seen as such integers. The bytes must begin at a multiple of 8. */
export function wordsOf(bytes: Uint8Array, bitpix: number): Words {
  const size = Math.abs(bitpix) / 8;
  const Kind = { 1: Uint8Array, 2: Uint16Array, 4: Uint32Array, 8: BigUint64Array }[size]!;
  return new Kind(bytes.buffer as ArrayBuffer, bytes.byteOffset, Math.floor(bytes.length / size)) as Words;
}
