import { Problem } from '@/shared/contract/problem';
import type { Edge } from '@/shared/contract/traces';
import { separation } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';
import { PIXELS_A_BEAM } from '@/shared/shell/assumedBeam';
import { modelRing, type FittedShell, type ModelRing } from '@/shared/shell/modelRing';

/** What a trace starts from. */
export interface TraceTask {
  shape: { nx: number; ny: number; channels: number };
  wcs: Wcs;
  /** The fit of a reading, around which the rim is looked for. */
  fit: FittedShell;
  /** The crest of the rim, or its steepest rise seen from the inside. */
  edge: Edge;
  /** Noise of one channel, in the unit of the planes; see channelNoise.ts. */
  noise: number;
  /** Full widths at half maximum; null where the header does not say: three pixels are taken. */
  beam: { majorDeg: number; minorDeg: number } | null;
}

/** A task with what all its channels share. */
export interface TracePlan extends Omit<TraceTask, 'beam'> {
  /** Channels to trace, rising. */
  channels: number[];
  ring: ModelRing;
  /** Side of a pixel at the shell, and the geometric mean of the beam's widths: degrees. */
  pixelDeg: number;
  beamDeg: number;
  /** The beam is not the header's. */
  beamAssumed: boolean;
}

/** Nearer to a cap than this the ring is a smudge; and what is seen there bends v_exp. */
const FURTHEST = 0.9;

/**
 * Which channels of a cube to trace, and with what.
 *
 * @throws Problem invalid-input where the fit has no ring on this cube (field fitId) or the noise is no number
 */
export function planTrace(task: TraceTask): TracePlan {
  const { shape, wcs, fit, noise, beam } = task;
  if (!(Number.isFinite(noise) && noise >= 0))
    throw refused('noise', 'The noise of the cube is not known, so a rim cannot be told from it.');
  if (Object.values(fit.parameters).some((p) => !Number.isFinite(p.value)))
    throw refused('fitId', 'The fit has a parameter without a value, so it cannot say where to look.');
  const ring = modelRing(fit, wcs.velocityStep);
  const channels = Array.from({ length: shape.channels }, (_, k) => k).filter(
    (k) => Math.abs(ring.reach(wcs.velocityOf(k))) <= FURTHEST,
  );
  if (channels.length === 0)
    throw refused('fitId', 'No channel of the cube lies within the velocities of this fit.');
  const pixelDeg = pixelSide(task);
  const widths = beam && beam.majorDeg > 0 && beam.minorDeg > 0 ? beam.majorDeg * beam.minorDeg : null;
  return {
    ...task,
    channels,
    ring,
    pixelDeg,
    beamDeg: widths === null ? PIXELS_A_BEAM * pixelDeg : Math.sqrt(widths),
    beamAssumed: widths === null,
  };
}

/** Root of the area of a pixel at the shell's centre, or in the middle of an image that does not show it. */
function pixelSide({ shape: { nx, ny }, wcs, fit: { parameters } }: TraceTask): number {
  const centre = wcs.galacticToPixel(parameters.l!.value, parameters.b!.value);
  for (const at of [centre, { x: (nx - 1) / 2, y: (ny - 1) / 2 }]) {
    if (at === null) continue;
    const [here, right, up] = [
      [at.x, at.y],
      [at.x + 1, at.y],
      [at.x, at.y + 1],
    ].map(([x, y]) => {
      const place = wcs.pixelToGalactic(x!, y!);
      return place && { lon: place.l, lat: place.b };
    });
    if (here && right && up) return Math.sqrt(separation(here, right) * separation(here, up));
  }
  throw refused('fitId', 'Neither the shell nor the middle of this image lies on the sky of its projection.');
}

const refused = (field: string, detail: string) => new Problem('invalid-input', detail, { field });
