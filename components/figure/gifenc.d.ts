/** The part of gifenc 1 that is used here; the package brings no types. */
declare module 'gifenc' {
  export type Colour = [number, number, number];
  export interface Encoder {
    /** Adds a picture of palette indices; `repeat` 0 loops for ever and counts with the first one. */
    writeFrame(
      index: Uint8Array,
      width: number,
      height: number,
      options: { palette?: Colour[]; delay: number; repeat?: number },
    ): void;
    finish(): void;
    bytes(): Uint8Array<ArrayBuffer>;
  }
  export function GIFEncoder(): Encoder;
  /** Colours that stand for those of RGBA pixels. */
  export function quantize(rgba: Uint8ClampedArray, most: number): Colour[];
  export function applyPalette(rgba: Uint8ClampedArray, palette: Colour[]): Uint8Array;
}
