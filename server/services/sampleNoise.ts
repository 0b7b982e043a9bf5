import { cubeNoise } from '@/shared/fits/cubeNoise';
import { shapeOf, stridesOf, type PixelSource } from '@/shared/fits/cubeOrder';
import { decodePixels } from '@/shared/fits/decode';
import { channelStatistics } from '@/shared/fits/statistics';
import { fillFrom, withPixels, type PixelPlace } from '../files/pixelFile';

export interface SampleTask {
  place: PixelPlace;
  /** Plane by plane. */
  head: PixelSource;
}

const CHANNELS = 64;
const PIXELS = 65_536;
/** Bands of neighbouring rows that the pixels of a channel come in: a read for each row takes longer than all the rest. */
const BANDS = 16;

/**
 * The noise of a cube from a sample, before it is read as a whole: bands of rows spread over up to 64 of its channels,
 * some 65 000 pixels of each. Good to about one per cent, and exact for a cube that is no larger than the sample.
 */
export async function sampleNoise({ place, head }: SampleTask): Promise<number | null> {
  const { nx, ny, channels } = shapeOf(head);
  const size = Math.abs(head.bitpix) / 8;
  const { start, channel: stride, x, y } = stridesOf(head);
  const [across, rows] = y >= x ? [nx, ny] : [ny, nx];
  const wanted = Math.min(rows, Math.max(1, Math.floor(PIXELS / across)));
  const bands = wanted === rows ? 1 : Math.min(BANDS, wanted);
  const deep = Math.floor(wanted / bands);
  const some = bands * deep;
  const raw = new Uint8Array(across * some * size);
  const values = new Float32Array(across * some);
  const noises: (number | null)[] = [];
  await withPixels(place, async (source) => {
    const count = Math.min(CHANNELS, channels);
    for (let i = 0; i < count; i++) {
      const plane = start + Math.floor((i * channels) / count) * stride * size;
      for (let band = 0; band < bands; band++)
        await fillFrom(
          source,
          raw.subarray(band * deep * across * size, (band + 1) * deep * across * size),
          plane + Math.floor((band * rows) / bands) * across * size,
        );
      decodePixels(raw, head, values);
      noises.push(channelStatistics(values).noise);
    }
  });
  return cubeNoise(noises);
}
