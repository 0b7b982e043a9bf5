import { degreesPerPixel } from '@/components/cube/Readout';
import type { Wcs } from '@/shared/sky/wcs';

/** Where the header names no beam, a nudge is this many pixels. */
const WITHOUT_BEAM = 0.5;
/** With Shift. */
const FAR = 10;

/** How far an arrow key moves a mark, pixels: a tenth of the beam, with Shift all of it. */
export function nudgeStep(
  axes: { nx: number; ny: number; beam: { major: number } | null },
  wcs: Pick<Wcs, 'pixelToSky'>,
  far: boolean,
): number {
  const step = axes.beam ? Math.max(axes.beam.major / 10 / degreesPerPixel(axes, wcs), 0.05) : WITHOUT_BEAM;
  return step * (far ? FAR : 1);
}
