import sharp from 'sharp';
import { blockAverage, blockFor } from '@/shared/image/blockAverage';

/** Longest side of a thumbnail, pixels. */
export const THUMBNAIL_SIZE = 96;
/** WebP holds at most 16383 pixels a side. */
const WIDEST_STRIP = 16_000;
const QUALITY = 82;

export interface SmallCube {
  planes: Float32Array;
  nx: number;
  ny: number;
  channels: number;
}

/**
 * One brightness window for the whole cube, so that its thumbnails compare: from the 1st to the 99.7th percentile of
 * all block averages. A cube of blanks, or of one value, gets a window around that value.
 */
export function brightnessWindow({ planes }: SmallCube): [number, number] {
  const step = Math.max(1, Math.floor(planes.length / 2_000_000)); // a sample is as good for a percentile
  const found = new Float32Array(Math.ceil(planes.length / step));
  let n = 0;
  for (let i = 0; i < planes.length; i += step) if (Number.isFinite(planes[i])) found[n++] = planes[i]!;
  const sorted = found.subarray(0, n).sort();
  const at = (share: number) => sorted[Math.min(n - 1, Math.floor(share * n))] ?? 0;
  const [low, high] = [at(0.01), at(0.997)];
  return low < high ? [low, high] : [low - 0.5, low + 0.5];
}

const planeOf = (small: SmallCube, channel: number) => {
  const size = small.nx * small.ny;
  return small.planes.subarray(channel * size, (channel + 1) * size);
};

/** Grey levels through the window, top row first (y grows upward on the sky); blanks are black. */
function paint(
  plane: Float32Array,
  nx: number,
  ny: number,
  [low, high]: [number, number],
  out: Uint8Array,
  stride = nx,
  left = 0,
) {
  for (let y = 0; y < ny; y++)
    for (let x = 0; x < nx; x++) {
      const level = ((plane[y * nx + x]! - low) / (high - low)) * 254 + 1.5;
      out[(ny - 1 - y) * stride + left + x] = Number.isNaN(level) ? 0 : Math.min(Math.max(level, 1), 255);
    }
}

const webp = (grey: Uint8Array, width: number, height: number) =>
  sharp(grey, { raw: { width, height, channels: 1 } })
    .webp({ quality: QUALITY })
    .toBuffer();

/** Pictures encoded at a time: enough to keep the encoder's threads busy. */
const AT_ONCE = 16;

/** The thumbnail of every channel, in order. */
export async function thumbnails(
  small: SmallCube,
  window: [number, number],
  signal: AbortSignal,
): Promise<Buffer[]> {
  const pictures: Buffer[] = [];
  for (let first = 0; first < small.channels; first += AT_ONCE) {
    signal.throwIfAborted();
    const some = Array.from({ length: Math.min(AT_ONCE, small.channels - first) }, (_, i) => first + i);
    pictures.push(...(await Promise.all(some.map((channel) => thumbnail(small, channel, window)))));
  }
  return pictures;
}

function thumbnail(small: SmallCube, channel: number, window: [number, number]): Promise<Buffer> {
  const grey = new Uint8Array(small.nx * small.ny);
  paint(planeOf(small, channel), small.nx, small.ny, window, grey);
  return webp(grey, small.nx, small.ny);
}

export interface Strip {
  bytes: Buffer;
  /** Pixels of one picture, and how many channels each stands for (1 unless there are thousands). */
  meta: { width: number; height: number; pictures: number; step: number };
}

/** All thumbnails side by side, channel 0 first: one picture to fetch instead of hundreds. */
export async function stripPicture(small: SmallCube, window: [number, number]): Promise<Strip> {
  const step = Math.ceil((2 * small.channels) / WIDEST_STRIP);
  const pictures = Math.ceil(small.channels / step);
  const widest = Math.max(2, Math.floor(WIDEST_STRIP / pictures));
  const block = Math.max(blockFor(small.nx, small.ny, THUMBNAIL_SIZE), Math.ceil(small.nx / widest));
  const width = Math.ceil(small.nx / block);
  const height = Math.ceil(small.ny / block);
  const grey = new Uint8Array(width * pictures * height);
  for (let i = 0; i < pictures; i++) {
    const { plane } = blockAverage(planeOf(small, i * step), small.nx, small.ny, block);
    paint(plane, width, height, window, grey, width * pictures, i * width);
  }
  return { bytes: await webp(grey, width * pictures, height), meta: { width, height, pictures, step } };
}
