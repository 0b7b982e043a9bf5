import { closeSync, openSync, writeSync } from 'node:fs';
import { planeByPlane, shapeOf, stridesOf, wordsOf, type PixelSource } from '@/shared/fits/cubeOrder';
import { fillFrom, withPixels, type PixelPlace } from '../files/pixelFile';

export interface RearrangeTask {
  from: PixelPlace;
  head: PixelSource;
  /** A file of the size of the copy; several threads write their shares of it. */
  to: string;
  /** Steps of the slowest axis from … to − 1. */
  share: [from: number, to: number];
  memoryBytes: number;
}

/** Channels gathered together: as many as share a line of the processor's cache where they are neighbours. */
const TOGETHER = 16;
/** A piece; larger ones are no quicker to read, and what is gathered from them leaves the processor's cache. */
const PIECE = 16 * 2 ** 20;

/** Which axis is the slowest, and how many steps it has: what shares are cut along. */
export function slowestAxis(head: PixelSource): { axis: 'row' | 'channel'; steps: number; stride: number } {
  const { nx, ny, channels } = shapeOf(head);
  const { x, y, channel } = stridesOf(head);
  const row = y >= x ? { steps: ny, stride: y } : { steps: nx, stride: x };
  return channel > row.stride || row.steps === 1
    ? { axis: 'channel', steps: channels, stride: channel }
    : { axis: 'row', ...row };
}

/**
 * Write the pixels of a cube in which channels are spread over the file plane by plane, without looking at them. The
 * file is read once, from front to back, in pieces as large as the memory allows. Runs in a thread of its own.
 */
export async function rearrangeChannels(task: RearrangeTask, onStep: (steps: number) => void): Promise<void> {
  const { head, memoryBytes } = task;
  const size = Math.abs(head.bitpix) / 8;
  const { start } = stridesOf(head);
  const slow = slowestAxis(head);
  const most = Math.max(1, Math.floor(Math.min(0.45 * memoryBytes, PIECE) / (slow.stride * size)));
  const steps = Math.min(most, task.share[1] - task.share[0]);
  const raw = new Uint8Array(steps * slow.stride * size);
  const file = openSync(task.to, 'r+');
  try {
    await withPixels(task.from, async (source) => {
      for (let at = task.share[0]; at < task.share[1]; at += steps) {
        const count = Math.min(steps, task.share[1] - at);
        const offset = start + at * slow.stride * size;
        // of the last step, what lies behind the last pixel of the cube need not be there
        const length = Math.min(count * slow.stride * size, source.size - offset, endOf(head) - offset);
        await fillFrom(source, raw.subarray(0, length), offset);
        scatter(head, raw, slow.axis, at, count, (bytes, place) =>
          writeSync(file, bytes, 0, bytes.length, place),
        );
        onStep(count);
      }
    });
  } finally {
    closeSync(file);
  }
}

const endOf = (head: PixelSource) => {
  const { nx, ny, channels } = shapeOf(head);
  const s = stridesOf(head);
  const last = (nx - 1) * s.x + (ny - 1) * s.y + (channels - 1) * s.channel;
  return s.start + (last + 1) * (Math.abs(head.bitpix) / 8);
};

/** Gather the pixels of one piece channel by channel, a few channels at a time, and write them. */
function scatter(
  head: PixelSource,
  raw: Uint8Array,
  axis: 'row' | 'channel',
  at: number,
  count: number,
  write: (bytes: Uint8Array, place: number) => void,
) {
  const size = Math.abs(head.bitpix) / 8;
  const { nx, ny, channels } = shapeOf(head);
  const s = stridesOf(head);
  const [across, rows] = planeByPlane(head).layout.naxis as [number, number];
  const [fast, slow] = s.y >= s.x ? [s.x, s.y] : [s.y, s.x];
  const rowCount = axis === 'row' ? count : rows;
  const channelCount = axis === 'row' ? channels : count;
  const run = rowCount * across;
  // one line of the cache apart, channels do not push each other out of it when a run is a power of two long
  const apart = run + 64 / size;
  const gathered = new Uint8Array(Math.min(TOGETHER, channelCount) * apart * size);
  const from = wordsOf(raw, head.bitpix) as Uint32Array;
  const to = wordsOf(gathered, head.bitpix) as Uint32Array;
  for (let first = 0; first < channelCount; first += TOGETHER) {
    const together = Math.min(TOGETHER, channelCount - first);
    for (let row = 0; row < rowCount; row++)
      for (let i = 0; i < across; i++) {
        let source = row * slow + i * fast + first * s.channel;
        let target = row * across + i;
        for (let k = 0; k < together; k++, source += s.channel, target += apart) to[target] = from[source]!;
      }
    for (let k = 0; k < together; k++) {
      const channel = (axis === 'row' ? 0 : at) + first + k;
      const row = axis === 'row' ? at : 0;
      write(
        gathered.subarray(k * apart * size, (k * apart + run) * size),
        (channel * nx * ny + row * across) * size,
      );
    }
  }
}
