import { Problem } from '@/shared/contract/problem';
import type { Bitpix } from './cubeHead';

/** How stored numbers become brightness: value = bzero + bscale x stored; the integer `blank` becomes NaN. */
export interface PixelFormat {
  bitpix: Bitpix;
  bscale: number;
  bzero: number;
  /** Decimal, for 64-bit integers do not fit a number; null when none. */
  blank: string | null;
}

/** Values at a time on the way through the scratch arrays: small enough to stay in the processor's cache. */
const CHUNK = 16_384;
/** Largest number that float32 holds. */
const FLOAT32_MAX = 3.4028234663852886e38;

/**
 * Decode big-endian FITS pixels.
 *
 * NaNs of any bit pattern, infinities and BLANK all become NaN. Stored integers are compared with BLANK before they
 * are scaled. The machine is taken to be little-endian, as every one that runs Node or a browser is.
 *
 * @param bytes  whole pixels, any alignment
 * @param out    receives bytes.length / pixel size values from `at` on; Float64Array keeps every digit
 * @returns how many of the values were infinite
 * @throws Problem invalid-input when the bytes are no whole pixels or do not fit
 */
export function decodePixels(
  bytes: Uint8Array,
  format: PixelFormat,
  out: Float32Array | Float64Array,
  at = 0,
): number {
  const size = Math.abs(format.bitpix) / 8;
  const count = bytes.length / size;
  if (!Number.isInteger(count) || at + count > out.length) {
    throw new Problem(
      'invalid-input',
      `${bytes.length} bytes of ${size} do not fit ${out.length - at} pixels.`,
    );
  }
  if (format.bitpix === -32 && format.bscale === 1 && format.bzero === 0 && out instanceof Float32Array) {
    return swapFloats(bytes, count, out, at);
  }
  const aligned = new ArrayBuffer(Math.min(CHUNK, count) * size);
  let infinite = 0;
  for (let start = 0; start < count; start += CHUNK) {
    const n = Math.min(CHUNK, count - start);
    new Uint8Array(aligned).set(bytes.subarray(start * size, (start + n) * size));
    infinite += decodeChunk(aligned, n, format, out, at + start);
  }
  return infinite;
}

/** The common case, straight from bytes to bits. */
function swapFloats(bytes: Uint8Array, count: number, out: Float32Array, at: number): number {
  const bits = new Uint32Array(out.buffer, out.byteOffset + 4 * at, count);
  const source =
    bytes.byteOffset % 4 === 0
      ? new Uint32Array(bytes.buffer, bytes.byteOffset, count)
      : new Uint32Array(bytes.slice().buffer, 0, count);
  let infinite = 0;
  for (let i = 0; i < count; i++) {
    let v = swap32(source[i]!);
    if ((v & 0x7f800000) === 0x7f800000) {
      if ((v & 0x007fffff) === 0) infinite++;
      v = 0x7fc00000;
    }
    bits[i] = v;
  }
  return infinite;
}

const swap32 = (v: number) => (v << 24) | ((v & 0xff00) << 8) | ((v >>> 8) & 0xff00) | (v >>> 24);

function decodeChunk(
  aligned: ArrayBuffer,
  n: number,
  { bitpix, bscale, bzero, blank }: PixelFormat,
  out: Float32Array | Float64Array,
  at: number,
): number {
  const none = 0.5; // no stored integer equals it
  const mark = blank === null ? none : Number(blank);
  switch (bitpix) {
    case 8: {
      const source = new Uint8Array(aligned);
      for (let i = 0; i < n; i++) out[at + i] = source[i] === mark ? NaN : bzero + bscale * source[i]!;
      return 0;
    }
    case 16: {
      const source = new Uint16Array(aligned);
      for (let i = 0; i < n; i++) {
        const v = (((source[i]! & 0xff) << 24) | ((source[i]! & 0xff00) << 8)) >> 16;
        out[at + i] = v === mark ? NaN : bzero + bscale * v;
      }
      return 0;
    }
    case 32: {
      const source = new Uint32Array(aligned);
      for (let i = 0; i < n; i++) {
        const v = swap32(source[i]!);
        out[at + i] = v === mark ? NaN : bzero + bscale * v;
      }
      return 0;
    }
    case 64: {
      const source = new Uint32Array(aligned);
      const marked = blank !== null;
      const wide = marked ? BigInt(blank) : 0n;
      const markHigh = Number(BigInt.asIntN(32, wide >> 32n));
      const markLow = Number(BigInt.asUintN(32, wide));
      for (let i = 0; i < n; i++) {
        const high = swap32(source[2 * i]!);
        const low = swap32(source[2 * i + 1]!) >>> 0;
        const isBlank = marked && high === markHigh && low === markLow;
        out[at + i] = isBlank ? NaN : bzero + bscale * (high * 4294967296 + low);
      }
      return 0;
    }
    case -32: {
      const source = new Uint32Array(aligned);
      for (let i = 0; i < n; i++) source[i] = swap32(source[i]!);
      return scaled(new Float32Array(aligned), n, bscale, bzero, out, at);
    }
    case -64: {
      const source = new Uint32Array(aligned);
      for (let i = 0; i < 2 * n; i += 2) {
        const high = swap32(source[i]!);
        source[i] = swap32(source[i + 1]!);
        source[i + 1] = high;
      }
      return scaled(new Float64Array(aligned), n, bscale, bzero, out, at);
    }
  }
}

function scaled(
  source: Float32Array | Float64Array,
  n: number,
  bscale: number,
  bzero: number,
  out: Float32Array | Float64Array,
  at: number,
): number {
  let infinite = 0;
  const most = out instanceof Float32Array ? FLOAT32_MAX : Number.MAX_VALUE;
  for (let i = 0; i < n; i++) {
    const v = bzero + bscale * source[i]!;
    // NaN fails both comparisons; what is too large for the output is as good as infinite.
    if (v <= most && v >= -most) out[at + i] = v;
    else {
      if (v === v) infinite++;
      out[at + i] = NaN;
    }
  }
  return infinite;
}
