import fc from 'fast-check';
import { decodePixels, type PixelFormat } from './decode';

const plain = (bitpix: PixelFormat['bitpix'], over: Partial<PixelFormat> = {}): PixelFormat => ({
  bitpix,
  bscale: 1,
  bzero: 0,
  blank: null,
  ...over,
});

/** Big-endian bytes at an odd offset, written by DataView: the slow way that the fast one must equal. */
function bytesOf(bitpix: PixelFormat['bitpix'], values: (number | bigint)[]): Uint8Array {
  const size = Math.abs(bitpix) / 8;
  const bytes = new Uint8Array(values.length * size + 1).subarray(1);
  const view = new DataView(bytes.buffer, 1);
  values.forEach((v, i) => {
    if (bitpix === 8) view.setUint8(i, Number(v));
    if (bitpix === 16) view.setInt16(2 * i, Number(v));
    if (bitpix === 32) view.setInt32(4 * i, Number(v));
    if (bitpix === 64) view.setBigInt64(8 * i, BigInt(v));
    if (bitpix === -32) view.setFloat32(4 * i, Number(v));
    if (bitpix === -64) view.setFloat64(8 * i, Number(v));
  });
  return bytes;
}

const decode = (format: PixelFormat, values: (number | bigint)[]) => {
  const out = new Float64Array(values.length);
  const infinite = decodePixels(bytesOf(format.bitpix, values), format, out);
  return { values: [...out], infinite };
};

describe('decodePixels', () => {
  it.each([
    [8, fc.integer({ min: 0, max: 255 })],
    [16, fc.integer({ min: -32768, max: 32767 })],
    [32, fc.integer({ min: -2147483648, max: 2147483647 })],
    [-32, fc.float({ noNaN: true, noDefaultInfinity: true })],
    [-64, fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e300, max: 1e300 })],
  ] as const)('BITPIX %d: bzero + bscale x stored, any alignment', (bitpix, stored) => {
    fc.assert(
      fc.property(fc.array(stored as fc.Arbitrary<number>, { maxLength: 40 }), (values) => {
        const { values: got } = decode(plain(bitpix, { bscale: -0.5, bzero: 3 }), values);
        expect(got).toEqual(values.map((v) => 3 - 0.5 * v));
      }),
    );
  });

  it('rounds 64-bit integers once, and tells BLANK from its neighbours', () => {
    const blank = -9223372036854775808n;
    const values = [blank, blank + 1n, 0n, -1n, 4294967296n, 9007199254740993n];
    const { values: got } = decode(plain(64, { blank: blank.toString() }), values);
    expect(got).toEqual([NaN, ...values.slice(1).map(Number)]);
  });

  it('compares BLANK before scaling', () => {
    expect(decode(plain(16, { bscale: 2, bzero: 1, blank: '3' }), [3, 1, 7]).values).toEqual([NaN, 3, 15]);
    expect(decode(plain(8, { blank: '255' }), [255, 254]).values).toEqual([NaN, 254]);
  });

  it('makes every NaN and infinity a blank, and counts the infinities', () => {
    const bits = new Uint8Array([
      0x7f, 0xc0, 0, 1, 0xff, 0x80, 0, 1, 0x7f, 0x80, 0, 0, 0xff, 0x80, 0, 0, 0x3f, 0x80, 0, 0,
    ]);
    const out = new Float32Array(5);
    expect(decodePixels(bits, plain(-32), out)).toBe(2);
    expect([...out]).toEqual([NaN, NaN, NaN, NaN, 1]);
    expect(decodePixels(bits, plain(-32, { bscale: 2 }), out)).toBe(2);
    expect([...out]).toEqual([NaN, NaN, NaN, NaN, 2]);
    expect(decode(plain(-64), [Infinity, NaN, 4])).toEqual({ values: [NaN, NaN, 4], infinite: 1 });
  });

  it('is the same in float32, over more than one chunk, and at a place of the output', () => {
    const values = Array.from({ length: 40_000 }, (_, i) => Math.fround(Math.sin(i)));
    const bytes = bytesOf(-32, values);
    const fast = new Float32Array(values.length + 2);
    decodePixels(bytes, plain(-32), fast, 2);
    const scaled = new Float32Array(values.length);
    decodePixels(bytes, plain(-32, { bzero: 1 }), scaled);
    expect(Array.from(fast.subarray(2))).toEqual(values);
    expect(Array.from(scaled)).toEqual(values.map((v) => Math.fround(v + 1)));
  });

  it('refuses half pixels and a short output', () => {
    expect(() => decodePixels(new Uint8Array(7), plain(-32), new Float32Array(4))).toThrow(/do not fit/);
    expect(() => decodePixels(new Uint8Array(8), plain(-32), new Float32Array(1))).toThrow(/do not fit/);
  });
});
