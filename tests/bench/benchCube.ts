import { seededRandom } from '@/shared/random';
import { cubeFile, STEP } from '../api/cubeFile';

export const SHAPE = { nx: 512, ny: 512, channels: 128 };
export const NAME = '512 x 512 x 128 float32, 128 MiB';

const TABLE = 2 ** 20;
const NOISE = 0.5;
/** A corner that was not observed. */
const BLANK_SIDE = 60;
const RING = { x: 260, y: 240, radius: 120, channel: 64, halfSpan: 22 };

/**
 * The cube of the benchmarks, the same bytes on every run: a line that drifts over the sky, an expanding shell, noise,
 * a blank corner. Normal numbers are drawn once and read from another place for each row: what is timed depends on
 * how values are distributed, not on whether rows repeat.
 */
export const benchCube = (): Buffer => benchField(SHAPE);

/** The same sky in a cube of another shape. */
export function benchField(shape: { nx: number; ny: number; channels: number }): Buffer {
  const random = seededRandom(2026);
  const normals = Float32Array.from({ length: TABLE }, () => NOISE * random.normal());
  let start = 0;
  return cubeFile({
    ...shape,
    cards: { OBJECT: 'Bench field' },
    value(x, y, channel) {
      if (x === 0) start = Math.floor(random.uniform() * (TABLE - shape.nx));
      if (x + y < BLANK_SIDE) return NaN;
      return normals[start + x]! + emission(x, y, channel * STEP);
    },
  });
}

function emission(x: number, y: number, v: number): number {
  const off = (v - 60 - 8 * Math.sin(x / 90) - 6 * Math.cos(y / 70)) / 18;
  const line = 12 * Math.exp(-0.5 * off * off);
  const u = (v - RING.channel * STEP) / (RING.halfSpan * STEP);
  if (Math.abs(u) >= 1) return line;
  const distance = (Math.hypot(x - RING.x, y - RING.y) - RING.radius * Math.sqrt(1 - u * u)) / 5;
  return line + (Math.abs(distance) < 4 ? 9 * Math.exp(-0.5 * distance * distance) : 0);
}
