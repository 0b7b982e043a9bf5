import { applyPalette, GIFEncoder, quantize, type Colour } from 'gifenc';

export interface Pixels {
  rgba: Uint8ClampedArray;
  width: number;
  height: number;
}

const COLOURS = 256;

/** Colours for a whole loop, found from some of its pictures: with one set for all, nothing flickers. */
export function loopColours(samples: readonly Pixels[]): Colour[] {
  const all = new Uint8ClampedArray(samples.reduce((sum, s) => sum + s.rgba.length, 0));
  let at = 0;
  for (const { rgba } of samples) {
    all.set(rgba, at);
    at += rgba.length;
  }
  return quantize(all, COLOURS);
}

export interface Frame {
  /** For each pixel the number of its colour. */
  index: Uint8Array;
  width: number;
  height: number;
}

/** A picture in those colours; a quarter of the memory. */
export const loopFrame = ({ rgba, width, height }: Pixels, palette: Colour[]): Frame => ({
  index: applyPalette(rgba, palette),
  width,
  height,
});

/** Writes pictures of one size as an animated GIF that runs for ever. */
export function loopWriter(palette: Colour[], delayMs: number) {
  const encoder = GIFEncoder();
  let first = true;
  return {
    add({ index, width, height }: Frame) {
      // the first picture carries the colours of all
      encoder.writeFrame(index, width, height, {
        delay: delayMs,
        ...(first && { palette, repeat: 0 }),
      });
      first = false;
    },
    bytes() {
      encoder.finish();
      return encoder.bytes();
    },
  };
}
