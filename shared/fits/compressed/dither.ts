import type { TiledImage } from './tiledImage';

const COUNT = 10_000;
/** Stands for a pixel of exactly zero under SUBTRACTIVE_DITHER_2. */
const ZERO = -2_147_483_646;

/** The standard's random numbers: Park & Miller's generator from seed 1 (FITS Standard 4.0, appendix I). */
const RANDOM = randomNumbers();

function randomNumbers(): Float32Array {
  const numbers = new Float32Array(COUNT);
  let seed = 1;
  for (let i = 0; i < COUNT; i++) {
    seed = (16_807 * seed) % 2_147_483_647; // below 2^53: exact
    numbers[i] = seed / 2_147_483_647;
  }
  return numbers;
}

/**
 * Turn the integers of a tile of a quantised image back into brightness (FITS Standard 4.0, section 10.2).
 *
 *     value = (integer − random + 0.5) · scale + zero,  without dithering: integer · scale + zero
 *
 * @param tile  number of the tile, from 0: it chooses where the random numbers start
 * @param blank the integer that marks a blank pixel; null: none
 * @param put   receives each pixel; NaN for a blank
 */
export function unquantise(
  integers: Int32Array,
  count: number,
  { dither, ditherSeed }: Pick<TiledImage, 'dither' | 'ditherSeed'>,
  tile: number,
  { scale, zero, blank }: { scale: number; zero: number; blank: number | null },
  put: (i: number, value: number) => void,
): void {
  const none = 0.5; // no integer equals it
  const mark = blank ?? none;
  if (dither === 'none') {
    for (let i = 0; i < count; i++) put(i, integers[i] === mark ? NaN : integers[i]! * scale + zero);
    return;
  }
  const zeroMark = dither === 'subtractive2' ? ZERO : none;
  let start = (tile + ditherSeed - 1) % COUNT;
  let next = startingAt(start);
  for (let i = 0; i < count; i++) {
    const q = integers[i]!;
    if (q === mark) put(i, NaN);
    else if (q === zeroMark) put(i, 0);
    else put(i, (q - RANDOM[next]! + 0.5) * scale + zero);
    if (++next === COUNT) {
      start = (start + 1) % COUNT;
      next = startingAt(start);
    }
  }
}

const startingAt = (start: number) => Math.floor(Math.fround(RANDOM[start]! * 500));
