import type { GraticuleLine } from '@/shared/image/graticule';
import { labelOf, niceTicks } from '@/shared/image/ticks';
import { toScreen, type Viewport } from '@/shared/image/viewport';

const DIRECTIONS = ['N', '45°', 'E', '135°', 'S', '225°', 'W', '315°'];

/**
 * Lines of a polar view: azimuths (north through east, towards greater longitude) across, distances from the centre
 * down. `reach`: degrees at the lower edge; null: in radii of the ring, where channels are stacked by them.
 */
export function polarLines(v: Viewport, reach: number, unit: '°' | ' ring radii'): GraticuleLine[] {
  const lines: GraticuleLine[] = DIRECTIONS.map((label, i) => {
    const x = (v.nx * i) / DIRECTIONS.length - 0.5;
    const path = [
      [
        { x, y: -0.5 },
        { x, y: v.ny - 0.5 },
      ],
    ];
    const foot = toScreen(v, { x, y: -0.5 });
    return { axis: 'lon', value: 45 * i, label, path, labelAt: { ...foot, sy: Math.min(foot.sy, v.height) } };
  });
  const { values, decimals } = niceTicks(0, reach, 5);
  for (const value of values) {
    if (value === 0) continue;
    const y = v.ny - 0.5 - (value / reach) * v.ny;
    const path = [
      [
        { x: -0.5, y },
        { x: v.nx - 0.5, y },
      ],
    ];
    const left = toScreen(v, { x: -0.5, y });
    const label = `${labelOf(value, decimals)}${unit}`;
    lines.push({ axis: 'lat', value, label, path, labelAt: { sx: Math.max(left.sx, 0), sy: left.sy } });
  }
  return lines;
}
