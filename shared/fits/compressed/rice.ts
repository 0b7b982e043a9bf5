import { Problem } from '@/shared/contract/problem';

/** Bits that name the length of a block's code, the code that means plain numbers, bits of a pixel. */
const CODES = {
  1: { lengthBits: 3, plain: 6, pixelBits: 8 },
  2: { lengthBits: 4, plain: 14, pixelBits: 16 },
  4: { lengthBits: 5, plain: 25, pixelBits: 32 },
} as const;

/**
 * Expand Rice-compressed integers (FITS Standard 4.0, section 10.4.1).
 *
 * The first pixel stands in front, then blocks of differences between neighbours, folded so that small ones of either
 * sign are small, each as a run of zeros, a one, and the low bits.
 *
 * @param bytes         the compressed tile
 * @param count         pixels of the tile
 * @param blockSize     pixels of a block; the last may be shorter
 * @param bytesPerPixel 1: bytes 0 … 255; 2 and 4: signed
 * @param out           receives `count` integers
 * @throws Problem compressed-damaged when the bits end before the pixels do
 */
export function riceDecode(
  bytes: Uint8Array,
  count: number,
  { blockSize, bytesPerPixel }: { blockSize: number; bytesPerPixel: 1 | 2 | 4 },
  out: Int32Array,
): void {
  const { lengthBits, plain, pixelBits } = CODES[bytesPerPixel];
  const end = bytes.length;
  const wrapped = 32 - pixelBits;
  let at = 0;
  let held = 0; // bits read from the stream and not used yet: the low `n` bits
  let n = 0;
  const bits = (wanted: number): number => {
    while (n < wanted) {
      if (at >= end) throw endsEarly();
      held = (held << 8) | bytes[at++]!;
      n += 8;
    }
    n -= wanted;
    const value = held >>> n;
    held &= (1 << n) - 1;
    return value;
  };
  const pixel = () => (pixelBits === 32 ? (bits(16) << 16) | bits(16) : bits(pixelBits));
  // Sums wrap around at the width of a pixel; bytes are unsigned, wider integers signed.
  const wrap = (v: number) => (wrapped === 24 ? v & 0xff : (v << wrapped) >> wrapped);

  let last = wrap(pixel());
  for (let start = 0; start < count; start += blockSize) {
    const stop = Math.min(start + blockSize, count);
    const low = bits(lengthBits) - 1;
    if (low < 0) {
      out.fill(last, start, stop);
      continue;
    }
    for (let i = start; i < stop; i++) {
      let folded: number;
      if (low === plain) folded = pixel();
      else {
        let zeros = 0;
        while (held === 0) {
          zeros += n;
          if (at >= end) throw endsEarly();
          held = bytes[at++]!;
          n = 8;
        }
        const lead = Math.clz32(held) - (32 - n); // zeros in front of the one
        zeros += lead;
        n -= lead + 1;
        held &= (1 << n) - 1;
        folded = low === 0 ? zeros : (zeros << low) | bits(low);
      }
      const difference = folded & 1 ? ~(folded >>> 1) : folded >>> 1;
      last = wrap(last + difference);
      out[i] = last;
    }
  }
}

const endsEarly = () =>
  new Problem('compressed-damaged', 'A Rice-compressed tile ends before all its pixels are read.');
