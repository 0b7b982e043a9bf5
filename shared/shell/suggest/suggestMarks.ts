import { medianOf } from '@/shared/fits/statistics';
import type { Plane } from '@/shared/shell/trace/radialProfile';
import { traceChannel } from '@/shared/shell/trace/traceChannel';
import { positionAngle, separation, type LonLat } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';

export interface SuggestionTask {
  channel: number;
  /** The channel as it is shown: brightness, NaN where blank; a reduced one says how many pixels a side it averages. */
  plane: Plane & { block: number };
  wcs: Wcs;
  /** The ring through the marks of this channel, galactic degrees. */
  ring: { l: number; b: number; theta: number };
  /** Marks of this channel: near them nothing is offered. */
  marks: readonly LonLat[];
  /** Mean width of the beam at half maximum, and the side of an image pixel: degrees. */
  beamDeg: number;
  pixelDeg: number;
}

/** A rim mark that is offered: on the crest of the brightness along its radius. */
export interface Suggestion {
  /** Which of the 24 sectors of azimuth it stands for; with the channel, what it is known by. */
  sector: number;
  /** Image pixels. */
  x: number;
  y: number;
  /** Standard error of its place, degrees, from the noise, the beam and how sharp the crest is. */
  sigma: number;
}

/** Marks closer together than this, seen from the centre, tell little more than one. */
const APART = 25;
/** The offered marks lie within this many of the reading's own from the ring, seen in its radius. */
const FURTHEST = 0.25;

/**
 * Rim marks to offer on a channel that carries a ring already: where the brightness along the ring's radii has its
 * crest, found as for a traced rim, clearest first, and at least 25 degrees of azimuth from every mark there is.
 */
export function suggestMarks(task: SuggestionTask): Suggestion[] {
  const { channel, plane, ring, beamDeg } = task;
  const { block, nx, ny, values } = plane;
  const centre = { lon: ring.l, lat: ring.b };
  const pixelDeg = task.pixelDeg * block;
  const wcs: Wcs = {
    ...task.wcs,
    galacticToPixel(l, b) {
      const at = task.wcs.galacticToPixel(l, b);
      return at && { x: reduced(at.x, block), y: reduced(at.y, block) };
    },
  };
  const found = traceChannel(
    {
      shape: { nx, ny, channels: channel + 1 },
      wcs,
      edge: 'ridge',
      noise: planeNoise(plane, beamDeg / pixelDeg),
      beamDeg: Math.max(beamDeg, 2 * pixelDeg),
      pixelDeg,
      ring: { reach: () => 0, centreAt: () => centre, radiusAt: () => ring.theta },
    },
    channel,
    values,
  );
  const azimuths = task.marks.map((mark) => positionAngle(centre, mark));
  const offered: Suggestion[] = [];
  found
    .map((f, sector) => ({ ...f, sector }))
    .sort((a, b) => (b.contrast ?? 0) - (a.contrast ?? 0))
    .forEach(({ sector, azimuth, radius, x, y, l, b, sigma }) => {
      if (radius === null || x === null || y === null || l === null || b === null || sigma === null) return;
      if (Math.abs(separation(centre, { lon: l, lat: b }) - ring.theta) > FURTHEST * ring.theta + beamDeg)
        return;
      if (azimuths.some((other) => turn(other, azimuth) < APART)) return;
      azimuths.push(azimuth);
      offered.push({ sector, x: full(x, block), y: full(y, block), sigma });
    });
  return offered.sort((a, b) => a.sector - b.sector);
}

/** Pixel coordinates of a plane whose pixels average `block` by `block` of the image's, and back. */
const reduced = (at: number, block: number) => (at + 0.5) / block - 0.5;
const full = (at: number, block: number) => (at + 0.5) * block - 0.5;

const turn = (a: number, b: number) => {
  const d = Math.abs(a - b) % 360;
  return d > 180 ? 360 - d : d;
};

/**
 * Noise of one plane from differences at half a beam along its rows, as if the noise had been seen through the beam:
 * an upper bound, since what is left of the gas is taken for noise. Good enough to leave out what nobody would mark.
 *
 * @param beam in pixels of the plane
 */
export function planeNoise({ values, nx, ny }: Plane, beam: number): number {
  const apart = Math.max(Math.round(beam / 2), 1);
  const found = new Float64Array(nx * ny);
  let n = 0;
  for (let j = 0; j < ny; j++)
    for (let i = apart; i + apart < nx; i++) {
      const at = j * nx + i;
      const second = values[at - apart]! - 2 * values[at]! + values[at + apart]!;
      if (Number.isFinite(second)) found[n++] = Math.abs(second);
    }
  if (n === 0) return 0;
  const alike = (steps: number) => Math.exp(-((steps * apart) ** 2) / (4 * (beam / 2.3548) ** 2));
  return (1.4826 * medianOf(found, n)) / Math.sqrt(6 - 8 * alike(1) + 2 * alike(2));
}
