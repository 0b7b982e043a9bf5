import { seededRandom } from '@/shared/random';
import { DEGREE, positionAngle, separation } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';
import { patterns } from './pattern';
import type { CubeRecipe, ShellRecipe } from './recipe';
import { shellProfile } from './shellProfile';
import { rimVisibility } from './visibleArc';

/** What a shell does to the channels of a cube. */
export interface ShellLayer {
  /** Dims the gas of one channel in the interior and adds the rim, in place; row y = 0 first. */
  addTo(plane: Float32Array, channel: number): void;
}

/** Where the rim is missing the shell is torn open, and this share of the hollow is filled again. */
const REFILLED = 0.45;
/** Clouds are left over in the interior where their pattern exceeds this many standard deviations, about. */
const CLOUD_LEVEL = 0.9;
const CLOUD_EDGE = 0.55;
/** Within this share of the radius from the centre a gap in the rim does not reach: the caps are whole. */
const WHOLE = 0.4;
/** Spectra of the three patterns, and how finely each is drawn. */
const CLUMP_SLOPE = -2;
const CLUMP_STEPS = 32;
const CLOUD_SLOPE = -3.4;
const CLOUD_STEPS = 64;
const RIPPLE_SLOPE = -4.5;
const RIPPLE_STEPS = 16;

/** Lay a shell over the sky of a cube: great-circle distances and position angles of all pixels, once. */
export function shellLayer(
  shell: ShellRecipe,
  shape: CubeRecipe['shape'],
  wcs: Wcs,
  seed: number,
): ShellLayer {
  const velocities = Array.from({ length: shape.channels }, (_, k) => wcs.velocityOf(k));
  const profile = shellProfile(shell, velocities, wcs.velocityStep);
  const random = seededRandom(seed);
  const [clumps] = patterns(CLUMP_SLOPE, CLUMP_STEPS, random);
  const [clouds] = patterns(CLOUD_SLOPE, CLOUD_STEPS, random);
  const [ripples] = patterns(RIPPLE_SLOPE, RIPPLE_STEPS, random);
  const brightness = (g: number) => shell.peak * Math.exp(shell.clumps * (g - shell.clumps / 2));
  const pixels = footprint(shell, shape, wcs, profile.reach * (1 + 4 * shell.ripple));

  return {
    addTo(plane, channel) {
      const u = Math.min(Math.max((velocities[channel]! - shell.vSys) / shell.vExp, -1), 1);
      const row = channel * (profile.steps + 1);
      for (const { index, impact, east, north, visibility } of pixels) {
        const p = impact * (1 + shell.ripple * ripples(east, north, u));
        if (p >= profile.reach) continue;
        const at = (p / profile.reach) * profile.steps;
        const inside = between(profile.inside, row, at);
        const rim = between(profile.rim, row, at);
        if (inside + rim < 1e-6) continue;
        const torn = 1 - REFILLED * (1 - visibility);
        const cleared = 1 / (1 + Math.exp((clouds(east, north, u) - CLOUD_LEVEL) / CLOUD_EDGE));
        const gone = shell.hollow * inside * torn * cleared;
        plane[index] = plane[index]! * (1 - gone) + rim * visibility * brightness(clumps(east, north, u));
      }
    },
  };
}

interface ShellPixel {
  index: number;
  /** sin(angle from the centre) / sin(theta). */
  impact: number;
  /** The place on the disc of the shell, at most 1 from its centre. */
  east: number;
  north: number;
  /** How much of the rim is seen in this direction. */
  visibility: number;
}

/** The pixels that a shell touches. */
function footprint(
  shell: ShellRecipe,
  { nx, ny }: CubeRecipe['shape'],
  wcs: Wcs,
  reach: number,
): ShellPixel[] {
  const centre = { lon: shell.l, lat: shell.b };
  const scale = Math.sin(shell.theta * DEGREE);
  const pixels: ShellPixel[] = [];
  for (let y = 0; y < ny; y++)
    for (let x = 0; x < nx; x++) {
      const place = wcs.pixelToGalactic(x, y);
      if (place === null) continue;
      const sky = { lon: place.l, lat: place.b };
      const off = separation(centre, sky);
      const impact = Math.sin(off * DEGREE) / scale;
      if (off >= 90 || impact >= reach) continue;
      const angle = positionAngle(centre, sky);
      const onDisc = Math.min(impact, 1);
      const hidden = (1 - rimVisibility(angle, shell)) * Math.min(onDisc / WHOLE, 1) ** 2;
      pixels.push({
        index: x + nx * y,
        impact,
        east: onDisc * Math.sin(angle * DEGREE),
        north: onDisc * Math.cos(angle * DEGREE),
        visibility: 1 - hidden,
      });
    }
  return pixels;
}

/** Linear interpolation in a row of a table. */
function between(table: Float32Array, row: number, at: number): number {
  const below = Math.floor(at);
  const share = at - below;
  const a = table[row + below]!;
  return a + share * (table[row + below + 1]! - a);
}
