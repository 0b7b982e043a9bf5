import { seededRandom } from '@/shared/random';
import { modelRadius } from '@/shared/shell/channelCurve';
import { destination } from '@/shared/sky/greatCircle';
import { buildWcs } from '@/shared/sky/wcs';
import type { CubeRecipe, ShellRecipe } from './recipe';
import { rimVisibility } from './visibleArc';
import { wcsOfRecipe } from './wcsOfRecipe';

export interface MarkingStyle {
  seed: number;
  /** How many channels carry marks, spread evenly over `span`; default 8. */
  channels?: number;
  /** Marks on each, where the arc lies in the image; default 9. */
  perChannel?: number;
  /** Part of the shell that is marked, in (v - vSys)/vExp; default -0.85 to 0.85. */
  span?: [number, number];
  /** Error of a mark across the rim, in beams; default 0.4. */
  error?: number;
  /** Error that all marks of a channel share, as a share of `error`; default 0.5. */
  ringBias?: number;
}

/** A rim mark in pixels and channels from 0; sigma in degrees. */
export interface SyntheticMark {
  channel: number;
  x: number;
  y: number;
  sigma: number;
}

/** The rim is marked where at least this much of it is seen. */
const PLAIN_TO_SEE = 0.6;
const ARC_STEPS = 720;

/**
 * The marks that a careful person would set on a shell's rim: on the visible arc only, spread over it, off by a normal
 * error across the rim and by one that each ring has of its own. They follow the truth of the recipe and not the
 * brightness of the cube.
 *
 * @returns by channel; fewer than asked for where the image ends or the shell spans few channels. Positions have two
 *   decimals.
 */
export function marksOf(
  recipe: Pick<CubeRecipe, 'shape' | 'sky' | 'velocity' | 'beam'>,
  shell: ShellRecipe,
  style: MarkingStyle,
): SyntheticMark[] {
  const { perChannel = 9, error = 0.4, ringBias = 0.5 } = style;
  const { nx, ny } = recipe.shape;
  const wcs = buildWcs(wcsOfRecipe(recipe));
  const random = seededRandom(style.seed);
  const sigma = error * Math.sqrt(recipe.beam.major * recipe.beam.minor);
  const centre = { lon: shell.l, lat: shell.b };
  const marks: SyntheticMark[] = [];
  for (const channel of channelsToMark(recipe.shape.channels, wcs.velocityOf, shell, style)) {
    const radius =
      (modelRadius(wcs.velocityOf(channel), wcs.velocityStep, shell) ?? 0) +
      ringBias * sigma * random.normal();
    const pixelAt = (angle: number, distance: number) => {
      const { lon, lat } = destination(centre, angle, distance);
      const at = wcs.galacticToPixel(lon, lat);
      return at && at.x >= 0 && at.x <= nx - 1 && at.y >= 0 && at.y <= ny - 1 ? at : null;
    };
    const seen = Array.from({ length: ARC_STEPS }, (_, i) => shell.arc.from + (360 * i) / ARC_STEPS).filter(
      (angle) => rimVisibility(angle, shell) > PLAIN_TO_SEE && pixelAt(angle, radius) !== null,
    );
    for (let i = 0; i < perChannel && seen.length > 0; i++) {
      const place = ((i + 0.15 + 0.7 * random.uniform()) / perChannel) * seen.length;
      const at = pixelAt(seen[Math.floor(place)]!, radius + sigma * random.normal());
      if (at)
        marks.push({ channel, x: hundredth(at.x), y: hundredth(at.y), sigma: Number(sigma.toPrecision(4)) });
    }
  }
  return marks;
}

/** Channels within the span, thinned out evenly to the number that is asked for. */
function channelsToMark(
  channels: number,
  velocityOf: (channel: number) => number,
  shell: ShellRecipe,
  { channels: wanted = 8, span = [-0.85, 0.85] }: MarkingStyle,
): number[] {
  const inside = Array.from({ length: channels }, (_, k) => k).filter((k) => {
    const u = (velocityOf(k) - shell.vSys) / shell.vExp;
    return u >= span[0] && u <= span[1];
  });
  if (inside.length <= wanted) return inside;
  return Array.from(
    { length: wanted },
    (_, i) =>
      inside[wanted === 1 ? inside.length >> 1 : Math.round((i * (inside.length - 1)) / (wanted - 1))]!,
  );
}

const hundredth = (value: number) => Math.round(100 * value) / 100;
