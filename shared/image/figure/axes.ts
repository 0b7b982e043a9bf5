import type { Figure, FigureColours } from '@/shared/image/figure/figure';
import { LETTER, LINE, type FigureLayout, type PanelBox } from '@/shared/image/figure/figureLayout';
import { element, words } from '@/shared/image/figure/svg';
import { textWidth } from '@/shared/image/figure/textWidth';

const TICK = 5;
const APART = 5;

/** Ticks on a panel's frame and, at the outer edges, their numbers; numbers that would touch are left out. */
export function axisNumbers(
  { lines, viewport: v }: FigureLayout,
  { hasLat, hasLon }: PanelBox,
  colours: FigureColours,
): string[] {
  const parts: string[] = [];
  let lastRight = -Infinity;
  let lastBelow = -Infinity;
  const placed = lines.flatMap((l) => (l.labelAt ? [{ ...l, at: l.labelAt }] : []));
  for (const { label, at } of placed.filter((l) => l.axis === 'lon').sort((a, b) => a.at.sx - b.at.sx)) {
    parts.push(tick(at.sx, v.height, at.sx, v.height - TICK, colours.onImage));
    const half = textWidth(label, LETTER) / 2;
    if (!hasLon || at.sx - half < lastRight + APART) continue;
    lastRight = at.sx + half;
    parts.push(words(label, at.sx, v.height + LETTER + 3, { 'text-anchor': 'middle' }));
  }
  for (const { label, at } of placed.filter((l) => l.axis === 'lat').sort((a, b) => a.at.sy - b.at.sy)) {
    parts.push(tick(0, at.sy, TICK, at.sy, colours.onImage));
    if (!hasLat || at.sy - LETTER / 2 < lastBelow) continue;
    lastBelow = at.sy + LETTER / 2;
    parts.push(words(label, -4, at.sy + LETTER * 0.36, { 'text-anchor': 'end' }));
  }
  return parts;
}

const tick = (x1: number, y1: number, x2: number, y2: number, stroke: string): string =>
  element('line', { x1, y1, x2, y2, stroke, 'stroke-width': 1 });

/** The names of both axes, once for all panels. */
export function axisTitles({ field }: FigureLayout, { axisNames }: Figure): string[] {
  const [x, y] = [LETTER, field.top + field.height / 2];
  return [
    words(axisNames.lon, field.left + field.width / 2, field.top + field.height + 2 * LINE, {
      'text-anchor': 'middle',
    }),
    words(axisNames.lat, x, y, {
      'text-anchor': 'middle',
      transform: `rotate(-90 ${x} ${y.toFixed(3)})`,
    }),
  ];
}
