import { useMemo } from 'react';
import type { StripPicture } from '@/components/strip/drawStrip';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useStripGrey, type StripGrey } from '@/hooks/planes/thumbnailPlanes';
import type { Cube } from '@/shared/contract/cubes';
import { TONE_CURVES, type Tone } from '@/shared/image/tone';

/** The cube's thumbnails in the palette and tone of the map; they keep one brightness window, so that they compare. */
export function useStripPicture(
  cube: Pick<Cube, 'id' | 'readyAt'>,
  ramp: Uint32Array,
  tone: Tone,
): { picture: StripPicture | null; problem: ApiProblem | null } {
  const { data: grey, error } = useStripGrey(cube);
  const picture = useMemo(() => (grey ? coloured(grey, ramp, tone) : null), [grey, ramp, tone]);
  return { picture, problem: error === undefined ? null : asProblem(error) };
}

/** Grey levels 1 … 255 through the tone into the palette; blanks, 0 (give or take the compression), take its low end. */
function coloured({ pixels, step }: StripGrey, ramp: Uint32Array, tone: Tone): StripPicture | null {
  const { forward } = TONE_CURVES[tone];
  const colour = Uint32Array.from(
    { length: 256 },
    (_, level) => ramp[Math.round(forward(Math.max(level - 1, 0) / 254) * (ramp.length - 1))]!,
  );
  const canvas = document.createElement('canvas');
  canvas.width = pixels.width;
  canvas.height = pixels.height;
  const ctx = canvas.getContext('2d');
  if (!ctx) return null;
  const image = ctx.createImageData(pixels.width, pixels.height);
  const from = new Uint32Array(pixels.data.buffer, pixels.data.byteOffset, pixels.width * pixels.height);
  const to = new Uint32Array(image.data.buffer);
  for (let i = 0; i < to.length; i++) to[i] = colour[from[i]! & 255]!;
  ctx.putImageData(image, 0, 0);
  return { image: canvas, width: canvas.width, height: canvas.height, step };
}
