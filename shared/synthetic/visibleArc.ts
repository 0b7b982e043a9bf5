import type { ShellRecipe } from './recipe';

/** Degrees over which the rim fades at the ends of its arc, and what is left of it beyond. */
const FADE = 5;
const FAINTEST = 0.06;

/** How much of the rim is seen at a position angle: near 1 on the arc, one half about its ends, 0.06 in the gap. */
export function rimVisibility(positionAngle: number, { arc }: Pick<ShellRecipe, 'arc'>): number {
  const half = (arc.to - arc.from) / 2;
  if (half >= 180) return 1;
  const off = Math.abs(((((positionAngle - arc.from - half + 180) % 360) + 360) % 360) - 180);
  return FAINTEST + (1 - FAINTEST) / (1 + Math.exp((off - half) / FADE));
}
