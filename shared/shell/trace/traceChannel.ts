import type { TracedSector } from '@/shared/contract/traces';
import { destination, type LonLat } from '@/shared/sky/greatCircle';
import { findRim, type RimInProfile } from '@/shared/shell/trace/findRim';
import { positionError } from '@/shared/shell/trace/positionError';
import {
  SECTORS,
  sectorAzimuth,
  sectorProfile,
  smoothed,
  type Plane,
} from '@/shared/shell/trace/radialProfile';
import type { TracePlan } from '@/shared/shell/trace/tracePlan';

/** A sector with the contrast of its rim (findRim.ts), by which the trace is called faint. */
export type SectorTrace = TracedSector & { contrast: number | null };

/** What of a plan one channel needs: a ring to look around, and how sharp and how noisy the picture is. */
export type ChannelPlan = Pick<
  TracePlan,
  'shape' | 'wcs' | 'ring' | 'edge' | 'noise' | 'beamDeg' | 'pixelDeg'
>;

/** The window on either side of the predicted radius: this share of it, and at least so many beams. */
const WINDOW = 0.35;
const LEAST_WINDOW = 1.5;
/** FWHM of a Gaussian in standard deviations. */
const FWHM = 2 * Math.sqrt(2 * Math.LN2);

/**
 * Look for the rim on one channel, in sectors of 15 degrees of azimuth: in the mean brightness along five great-circle
 * rays, sampled every half pixel, smoothed by half a beam, within 35 % of the radius that the fit predicts.
 *
 * @param values the channel, row by row from y = 0, NaN where blank
 * @returns one entry a sector, found or rejected with the reason
 */
export function traceChannel(
  plan: ChannelPlan,
  channel: number,
  values: Float32Array | Float64Array,
): SectorTrace[] {
  const { shape, wcs, ring } = plan;
  const { nx, ny } = shape;
  if (values.length !== nx * ny)
    throw new RangeError(`${values.length} values are no plane of ${nx} x ${ny} pixels`);
  const velocity = wcs.velocityOf(channel);
  const centre = ring.centreAt(velocity);
  return Array.from({ length: SECTORS }, (_, sector) => {
    const azimuth = sectorAzimuth(sector);
    const predicted = ring.radiusAt(velocity, azimuth);
    if (predicted === null) throw new RangeError(`channel ${channel} lies beyond a cap of the shell`);
    const place = { channel, velocity, azimuth, predicted };
    return { ...place, ...traceSector(plan, { values, nx, ny }, centre, sector, predicted) };
  });
}

type Finding = Omit<SectorTrace, 'channel' | 'velocity' | 'azimuth' | 'predicted'>;

function traceSector(
  plan: ChannelPlan,
  plane: Plane,
  centre: LonLat,
  sector: number,
  predicted: number,
): Finding {
  const { wcs, beamDeg, pixelDeg, noise, edge } = plan;
  const step = pixelDeg / 2;
  const half = Math.max(WINDOW * predicted, LEAST_WINDOW * beamDeg);
  const from = Math.max(predicted - half, step);
  const radii = Float64Array.from(
    { length: Math.max(Math.ceil((predicted + half - from) / step), 1) },
    (_, i) => from + i * step,
  );
  const mean = sectorProfile(plane, wcs, centre, sector, radii);
  if (typeof mean === 'string') return without(mean);

  const beam = beamDeg / step;
  const profile = smoothed(mean, beam / FWHM / 2);
  const beamsAlong = Math.max((radii[radii.length >> 1]! * 2 * Math.PI) / SECTORS / beamDeg, 1);
  const profileNoise = noise / Math.sqrt(beamsAlong);
  const rim: RimInProfile = findRim(profile, { edge, noise: profileNoise, beam });
  if (typeof rim === 'string') return without(rim);

  const radius = from + rim.at * step;
  const { lon, lat } = destination(centre, sectorAzimuth(sector), radius);
  const pixel = wcs.galacticToPixel(lon, lat);
  return {
    radius,
    l: lon,
    b: lat,
    x: pixel?.x ?? null,
    y: pixel?.y ?? null,
    sigma:
      step * positionError({ edge, noise: profileNoise, beam, curvature: rim.curvature, most: half / step }),
    rejected: null,
    contrast: rim.contrast,
  };
}

const without = (rejected: NonNullable<TracedSector['rejected']>): Finding => ({
  radius: null,
  l: null,
  b: null,
  x: null,
  y: null,
  sigma: null,
  rejected,
  contrast: null,
});
