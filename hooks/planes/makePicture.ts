import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { differenceOf, meanOf } from '@/shared/image/combine';
import { dequantise, quantise } from '@/shared/image/quantise';
import { resampled, samplingOf, type Sampling } from '@/shared/image/resample';
import { smoothed, type Covariance } from '@/shared/image/smoothing';
import type { LonLat } from '@/shared/sky/greatCircle';
import { polarView, stereographicView } from '@/shared/sky/polarView';
import { buildWcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

/** Another map of the same sky about a centre (galactic degrees). */
export interface PictureView {
  kind: 'polar' | 'stereographic';
  centre: LonLat;
  reach: number;
  nx: number;
  ny: number;
}

/** What is to be made of some planes of one size; plain, so that it can be sent to another thread. */
export interface PictureJob {
  channel: number;
  /** Averaged. */
  planes: ChannelPlane[];
  /** Averaged, and subtracted from the former. */
  minus: ChannelPlane[];
  /** In pixels of the whole image. */
  smooth: Covariance | null;
  /** A wide smoothing that is subtracted. */
  less: Covariance | null;
  view: PictureView | null;
  /** Of a stack: by how much each plane's distances from the centre are scaled to lie on each other. */
  stretch: number[] | null;
  wcs: WcsSpec;
}

/** Samplings cost a coordinate transformation for each pixel: the last ones are kept. */
const KEPT = 64;
const samplings = new Map<string, Sampling>();

/**
 * Average, subtract, smooth, take off the wide smoothing, and show in another view: in this order.
 *
 * @throws RangeError when the planes differ in size
 */
export function makePicture(job: PictureJob): ChannelPlane {
  const [first] = job.planes;
  if (!first) throw new RangeError('There is nothing to make a picture of.');
  const { width, height, block } = first;
  const done = (values: Float32Array, nx: number, ny: number, blocked: number): ChannelPlane => {
    const { scale, offset, blank, values: numbers } = quantise(values);
    return {
      channel: job.channel,
      values: numbers,
      width: nx,
      height: ny,
      block: blocked,
      scale,
      offset,
      blank,
    };
  };
  if (job.stretch && job.view) {
    const { nx, ny } = job.view;
    const sheets = job.planes.map((plane, i) =>
      quantise(
        resampled(
          finished([plane], job),
          plane.width,
          plane.height,
          plane.block,
          sampling(job, job.stretch![i]!),
        ),
      ),
    );
    return done(meanOf(sheets), nx, ny, 1);
  }
  const values = finished(job.planes, job);
  if (!job.view) return done(values, width, height, block);
  return done(resampled(values, width, height, block, sampling(job, 1)), job.view.nx, job.view.ny, 1);
}

function finished(planes: ChannelPlane[], { minus, smooth, less }: PictureJob): Float32Array {
  const { width, height, block } = planes[0]!;
  const own = planes.length === 1 ? dequantise(planes[0]!) : meanOf(planes);
  let values = minus.length > 0 ? differenceOf(own, meanOf(minus)) : own;
  if (smooth) values = smoothed(values, width, height, reduced(smooth, block));
  if (less) values = differenceOf(values, smoothed(values, width, height, reduced(less, block)));
  return values;
}

const reduced = ({ xx, xy, yy }: Covariance, block: number): Covariance => ({
  xx: xx / block ** 2,
  xy: xy / block ** 2,
  yy: yy / block ** 2,
});

function sampling({ view, wcs }: PictureJob, stretch: number): Sampling {
  const { kind, centre, reach, nx, ny } = view!;
  const key = JSON.stringify([view, stretch, wcs.sky]);
  const known = samplings.get(key);
  if (known) return known;
  const cube = buildWcs(wcs);
  const sky =
    kind === 'polar'
      ? polarView({ centre, reach: reach * stretch, nx, ny }, cube)
      : stereographicView(centre, reach, nx, wcs);
  const made = samplingOf(nx, ny, (x, y) => {
    const at = sky.pixelToGalactic(x, y);
    return at && cube.galacticToPixel(at.l, at.b);
  });
  if (samplings.size >= KEPT) samplings.delete(samplings.keys().next().value!);
  samplings.set(key, made);
  return made;
}
