import { destination, positionAngle, separation, type LonLat } from '@/shared/sky/greatCircle';

/** What is cut out of a cube; galactic degrees. */
export type Slice =
  | { kind: 'segment'; l: number; b: number; toL: number; toB: number }
  | { kind: 'ring'; l: number; b: number; radius: number }
  /** A spectrum of a point (radius 0), a disc, or a ring between `inner` and `radius`. */
  | { kind: 'spectrum'; l: number; b: number; radius: number; inner: number };
export type SliceKind = Slice['kind'];

export const SLICE_WORDS: Record<SliceKind, string> = {
  segment: 'Segment',
  ring: 'Ring',
  spectrum: 'Spectrum',
};

const short = (value: number) => String(Number(value.toPrecision(7)));

/** The address of a slice. */
export function sliceText(slice: Slice | null): string | undefined {
  if (!slice) return undefined;
  const numbers =
    slice.kind === 'segment'
      ? [slice.l, slice.b, slice.toL, slice.toB]
      : slice.kind === 'ring'
        ? [slice.l, slice.b, slice.radius]
        : [slice.l, slice.b, slice.radius, slice.inner];
  return [slice.kind, ...numbers.map(short)].join(',');
}

/** Read an address; null where it makes no sense. */
export function sliceOfText(text: string | null): Slice | null {
  const [kind, ...rest] = (text ?? '').split(',');
  const [l, b, c, d] = rest.map(Number);
  if (
    l === undefined ||
    b === undefined ||
    c === undefined ||
    !rest.every((r) => r !== '' && Number.isFinite(Number(r)))
  )
    return null;
  if (Math.abs(b) > 90) return null;
  if (kind === 'segment' && d !== undefined && Math.abs(d) <= 90) return { kind, l, b, toL: c, toB: d };
  if (kind === 'ring' && c > 0 && c <= 90) return { kind, l, b, radius: c };
  if (kind === 'spectrum' && d !== undefined && c >= 0 && d >= 0 && (d < c || c === 0))
    return { kind, l, b, radius: c, inner: d };
  return null;
}

/** A handle to take hold of. */
export interface Handle {
  name: string;
  at: LonLat;
}

/** Where a slice can be taken hold of. */
export function handlesOf(slice: Slice): Handle[] {
  const at = { lon: slice.l, lat: slice.b };
  if (slice.kind === 'segment')
    return [
      { name: 'Start of the slice', at },
      { name: 'End of the slice', at: { lon: slice.toL, lat: slice.toB } },
    ];
  const east = (radius: number) => destination(at, 90, radius);
  const centre = { name: slice.kind === 'ring' ? 'Centre of the ring' : 'Place of the spectrum', at };
  if (slice.radius === 0) return [centre];
  const rim = {
    name: slice.kind === 'ring' ? 'Rim of the ring' : 'Edge of the disc',
    at: east(slice.radius),
  };
  if (slice.kind === 'ring' || slice.inner === 0) return [centre, rim];
  return [centre, rim, { name: 'Inner edge', at: east(slice.inner) }];
}

/** Move one handle to a place: a centre takes its ring along. */
export function moved(slice: Slice, handle: number, to: LonLat): Slice {
  const at = { lon: slice.l, lat: slice.b };
  if (slice.kind === 'segment') {
    const next = handle === 0 ? { ...slice, l: to.lon, b: to.lat } : { ...slice, toL: to.lon, toB: to.lat };
    // a segment keeps a length: its ends may not meet
    return separation({ lon: next.l, lat: next.b }, { lon: next.toL, lat: next.toB }) > 1e-4 ? next : slice;
  }
  if (handle === 0) return { ...slice, l: to.lon, b: to.lat };
  const radius = Math.min(Math.max(separation(at, to), 1e-3), 90);
  if (slice.kind === 'ring') return { ...slice, radius };
  if (handle === 1) return { ...slice, radius: Math.max(radius, slice.inner * 1.05) };
  return { ...slice, inner: Math.min(radius, slice.radius * 0.95) };
}

/** Places along a slice as it is drawn on the map: a line, or one or two rings. */
export function outlines(slice: Slice): LonLat[][] {
  const at = { lon: slice.l, lat: slice.b };
  if (slice.kind === 'segment') {
    const end = { lon: slice.toL, lat: slice.toB };
    const [length, angle] = [separation(at, end), positionAngle(at, end)];
    return [Array.from({ length: 65 }, (_, i) => destination(at, angle, (length * i) / 64))];
  }
  const ring = (radius: number) =>
    Array.from({ length: 97 }, (_, i) => destination(at, (360 * (i % 96)) / 96, radius));
  const radii = slice.kind === 'ring' ? [slice.radius] : [slice.radius, slice.inner];
  return radii.filter((r) => r > 0).map(ring);
}

/** Degrees along a cut from its first place to its last; a ring is told in azimuth. */
export const cutLength = (slice: Exclude<Slice, { kind: 'spectrum' }>): number =>
  slice.kind === 'ring'
    ? 360
    : separation({ lon: slice.l, lat: slice.b }, { lon: slice.toL, lat: slice.toB });

/** The place at a share of the way along a cut. */
export function placeAlong(slice: Exclude<Slice, { kind: 'spectrum' }>, share: number): LonLat {
  const at = { lon: slice.l, lat: slice.b };
  if (slice.kind === 'ring') return destination(at, 360 * share, slice.radius);
  const end = { lon: slice.toL, lat: slice.toB };
  return destination(at, positionAngle(at, end), separation(at, end) * share);
}

/** What to begin with: about the model, or about the middle of the image; `reach`: half of its smaller side, degrees. */
export function firstSlice(kind: SliceKind, centre: LonLat, theta: number | null, reach: number): Slice {
  const size = theta ?? reach * 0.5;
  const place = { l: centre.lon, b: centre.lat };
  if (kind === 'ring') return { kind, ...place, radius: size };
  if (kind === 'spectrum') return { kind, ...place, radius: 0, inner: 0 };
  const [from, to] = [destination(centre, 90, size * 1.4), destination(centre, 270, size * 1.4)];
  return { kind, l: from.lon, b: from.lat, toL: to.lon, toB: to.lat };
}
