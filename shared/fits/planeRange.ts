import type { CubeHead } from './cubeHead';

/** What of a cube's head the geometry of its bytes needs. */
export type CubeLayout = Pick<CubeHead, 'bitpix' | 'dataOffset' | 'layout' | 'container'>;

/** Bytes to read in one go. `element` is the number of its first pixel in the file's order. */
export interface ByteSlice {
  offset: number;
  length: number;
  element: number;
}

/** Unwanted bytes between wanted ones that are read along rather than skipped by another read. */
const MAX_GAP = 65_536;

interface Loop {
  stride: number;
  from: number;
  to: number;
  /** Distance in the output between neighbours along this axis. */
  out: number;
}

/**
 * The slices of the file that hold channels from … to − 1, in order, none longer than `maxBytes`.
 *
 * One slice a channel or fewer when the spectral axis is the slowest; runs of pixels when it lies between the sky
 * axes; the whole of the data when it is the fastest: read many channels at a time then. Of axes beyond the three the
 * chosen plane is taken (layout.stokes), else the first.
 *
 * @param maxBytes upper limit of a slice; at least one pixel
 * @throws RangeError for a cube that is not plain
 */
export function* planeSlices(
  head: CubeLayout,
  from: number,
  to: number,
  maxBytes = 1 << 22,
): Generator<ByteSlice> {
  const size = Math.abs(head.bitpix) / 8;
  const most = Math.max(1, Math.floor(maxBytes / size));
  requirePlain(head);
  const base = planeBase(head);
  for (const [start, end] of spans(loopsOf(head, from, to), MAX_GAP / size)) {
    for (let element = base + start; element < base + end; element += most) {
      const count = Math.min(most, base + end - element);
      yield { offset: head.dataOffset + element * size, length: count * size, element };
    }
  }
}

/**
 * Put the decoded pixels of a slice where they belong in planes of channels from … to − 1, row by row from y = 0,
 * x fastest, one plane after the other.
 *
 * @param values the slice's pixels, in the file's order
 * @param out    nx · ny · (to − from) values
 */
export function placeSlice(
  head: CubeLayout,
  slice: ByteSlice,
  values: Float32Array | Float64Array,
  from: number,
  to: number,
  out: Float32Array | Float64Array,
): void {
  const [fast, middle, slow] = loopsOf(head, from, to);
  const begin = slice.element - planeBase(head);
  const end = begin + values.length;
  for (let k = slow.from; k < slow.to; k++) {
    const slowBase = k * slow.stride;
    if (slowBase >= end) break;
    if (slowBase + middle.to * middle.stride + fast.to * fast.stride <= begin) continue;
    for (let j = middle.from; j < middle.to; j++) {
      const base = slowBase + j * middle.stride;
      const first = Math.max(fast.from, Math.ceil((begin - base) / fast.stride));
      const last = Math.min(fast.to, Math.ceil((end - base) / fast.stride));
      let target =
        (k - slow.from) * slow.out + (j - middle.from) * middle.out + (first - fast.from) * fast.out;
      for (let i = first; i < last; i++, target += fast.out) {
        out[target] = values[base + i * fast.stride - begin]!;
      }
    }
  }
}

/** Byte offset of one pixel. */
export function pixelOffset(head: CubeLayout, x: number, y: number, channel: number): number {
  requirePlain(head);
  const { naxis, longitude, latitude, spectral } = head.layout;
  const element =
    planeBase(head) +
    x * strideOf(naxis, longitude) +
    y * strideOf(naxis, latitude) +
    channel * strideOf(naxis, spectral);
  return head.dataOffset + element * (Math.abs(head.bitpix) / 8);
}

/** True when a channel is one run of bytes, so that channels can be read one by one at no loss. */
export function isChannelContiguous(head: CubeLayout): boolean {
  const { longitude, latitude, spectral } = head.layout;
  return spectral > longitude && spectral > latitude;
}

/** Pixels of a compressed cube have no place in its file: that is a mistake in the code, not of a person. */
function requirePlain({ container = 'plain' }: CubeLayout): void {
  if (container !== 'plain')
    throw new RangeError(`The pixels of a ${container} cube are read from its plain copy.`);
}

/** Number of the first pixel of the plane that is read along the Stokes axis. */
function planeBase({ layout: { naxis, stokes } }: CubeLayout): number {
  return stokes ? stokes.plane * strideOf(naxis, stokes.axis) : 0;
}

const strideOf = (naxis: number[], axis: number) =>
  naxis.slice(0, axis).reduce((product, n) => product * n, 1);

/** The three axes as loops, fastest first, over the wanted channels and the whole sky. */
function loopsOf({ layout }: CubeLayout, from: number, to: number): [Loop, Loop, Loop] {
  const { naxis, longitude, latitude, spectral } = layout;
  const nx = naxis[longitude]!;
  const ny = naxis[latitude]!;
  const loops: Loop[] = [
    { stride: strideOf(naxis, longitude), from: 0, to: nx, out: 1 },
    { stride: strideOf(naxis, latitude), from: 0, to: ny, out: nx },
    { stride: strideOf(naxis, spectral), from, to, out: nx * ny },
  ];
  return loops.sort((a, b) => a.stride - b.stride || a.to - b.to) as [Loop, Loop, Loop];
}

/** Runs of pixels [start, end) that hold all wanted ones, joined over gaps of up to `gap` pixels. */
function* spans(loops: [Loop, Loop, Loop], gap: number): Generator<[number, number]> {
  const [fast, middle, slow] = loops;
  let open: [number, number] | null = null;
  const run = (fast.to - fast.from - 1) * fast.stride + 1;
  for (let k = slow.from; k < slow.to; k++) {
    for (let j = middle.from; j < middle.to; j++) {
      const start = k * slow.stride + j * middle.stride + fast.from * fast.stride;
      if (open && start - open[1] <= gap) open[1] = start + run;
      else {
        if (open) yield open;
        open = [start, start + run];
      }
    }
  }
  if (open) yield open;
}
