import { channelCurve, curveTable, modelRadius, type RingParameters } from '@/shared/shell/channelCurve';
import { separation, type LonLat } from '@/shared/sky/greatCircle';

/** Degrees from a centre for each pixel (or block of them) of an image; NaN outside the projection. */
export interface DistanceField {
  width: number;
  height: number;
  block: number;
  degrees: Float32Array;
}

/** Distances from a centre (galactic) over an image, at the middle of each block. */
export function distanceField(
  sky: { pixelToGalactic(x: number, y: number): { l: number; b: number } | null },
  { nx, ny }: { nx: number; ny: number },
  block: number,
  centre: LonLat,
): DistanceField {
  const [width, height] = [Math.ceil(nx / block), Math.ceil(ny / block)];
  const degrees = new Float32Array(width * height);
  for (let j = 0, at = 0; j < height; j++)
    for (let i = 0; i < width; i++, at++) {
      const place = sky.pixelToGalactic((i + 0.5) * block - 0.5, (j + 0.5) * block - 0.5);
      degrees[at] = place ? separation(centre, { lon: place.l, lat: place.b }) : NaN;
    }
  return { width, height, block, degrees };
}

/** A rim is never thinner than this share of the shell's radius: real ones are about ten times as thick. */
const THINNEST = 0.01;

/**
 * Where a sphere shows its rim in one channel: a ring of unit height with a Gaussian profile. Its width holds what the
 * beam and the width of the channel spread; of the thickness of the gas it knows nothing.
 *
 * @param beam full width at half maximum, degrees
 * @returns zeros for a channel beyond the caps
 */
export function modelPicture(
  field: DistanceField,
  velocity: number,
  channelWidth: number,
  shell: RingParameters,
  beam: number,
): Float32Array {
  const out = new Float32Array(field.degrees.length);
  const radius = modelRadius(velocity, channelWidth, shell);
  if (radius === null) return out;
  const one = curveTable(1);
  const theta = (shell.theta * Math.PI) / 180;
  channelCurve(velocity, channelWidth, theta, shell.vSys, shell.vExp, one, 0);
  const within = one.variance[0]! * (180 / Math.PI) ** 2;
  const variance = within + beam ** 2 / (8 * Math.LN2) + (THINNEST * shell.theta) ** 2;
  for (let i = 0; i < out.length; i++)
    out[i] = Math.exp(-((field.degrees[i]! - radius) ** 2) / (2 * variance));
  return out;
}
