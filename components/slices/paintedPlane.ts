import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { buildLut, paint, type Look } from '@/shared/image/tone';

/** A plane painted on a canvas of its own size, its rows in the order given; null where there is no canvas. */
export function paintedPlane(
  plane: ChannelPlane,
  look: Look,
  rows: readonly number[],
): HTMLCanvasElement | null {
  const { width, height, values } = plane;
  const ordered = new Uint16Array(values.length);
  for (let j = 0; j < height; j++) {
    const from = (rows[j] ?? j) * width;
    ordered.set(values.subarray(from, from + width), j * width);
  }
  const canvas = document.createElement('canvas');
  canvas.width = width;
  canvas.height = height;
  const ctx = canvas.getContext('2d');
  if (!ctx) return null;
  const image = ctx.createImageData(width, height);
  paint(ordered, buildLut(plane, look), new Uint32Array(image.data.buffer));
  ctx.putImageData(image, 0, 0);
  return canvas;
}
