import type { Figure, FigureColours, FigurePanel } from '@/shared/image/figure/figure';
import { LETTER, type FigureLayout } from '@/shared/image/figure/figureLayout';
import { layerParts } from '@/shared/image/figure/layerParts';
import { edged, line, onImage } from '@/shared/image/figure/strokes';
import { element, short } from '@/shared/image/figure/svg';
import { textWidth } from '@/shared/image/figure/textWidth';
import { toScreen, type ImagePoint, type Viewport } from '@/shared/image/viewport';

/** From this many units a pixel on, pixels are shown as what they are. */
const PIXELS_SHOW = 12;
const INSET = 7;

/** Picture, lines and marks of one panel, from its upper left corner. */
export function panelParts(
  figure: Figure,
  panel: FigurePanel,
  { viewport: v, lines }: FigureLayout,
  { first, last }: { first: boolean; last: boolean },
): string[] {
  const { colours } = figure;
  const parts = [element('rect', { x: 0, y: 0, width: v.width, height: v.height, fill: colours.image })];
  if (panel.raster) parts.push(picture(panel, v));
  for (const { path } of lines)
    parts.push(line(path, v, { stroke: colours.onImage, 'stroke-width': 0.6, opacity: 0.2 }));
  for (const { path, strong } of panel.contours ?? [])
    parts.push(line(path, v, { stroke: colours.onImage, 'stroke-width': strong ? 1.3 : 0.8, opacity: 0.8 }));
  if (panel.layers) parts.push(...layerParts(panel.layers, v, colours));
  if (panel.ownRing)
    parts.push(
      ...edged(panel.ownRing, v, colours, {
        class: 'ring-marks',
        stroke: colours.person,
        'stroke-width': 1.3,
        'stroke-dasharray': '5 4',
      }),
    );
  if (panel.modelRing)
    parts.push(
      ...edged(panel.modelRing, v, colours, {
        class: 'ring-model',
        stroke: colours.model,
        'stroke-width': 1.7,
      }),
    );
  if (panel.centre) parts.push(centre(panel.centre, v, colours));
  for (const mark of panel.marks) {
    const { sx, sy } = toScreen(v, mark);
    const hollow = mark.unsure || mark.faint;
    parts.push(
      element('circle', {
        class: mark.faint ? 'mark-beside' : 'mark',
        cx: sx,
        cy: sy,
        r: mark.faint ? 2.4 : 4,
        fill: mark.faint ? 'none' : hollow ? colours.image : colours.person,
        stroke: hollow ? colours.person : colours.image,
        'stroke-width': mark.faint ? 0.8 : 1.2,
      }),
    );
  }
  const room = v.width - 2 * INSET - textWidth(panel.label, LETTER);
  parts.push(onImage(panel.label, INSET, LETTER + INSET - 2, colours));
  if (first && textWidth(figure.source, LETTER) < room - LETTER)
    parts.push(
      onImage(figure.source, v.width - INSET, LETTER + INSET - 2, colours, { 'text-anchor': 'end' }),
    );
  if (last) parts.push(...corner(figure, v));
  return parts;
}

function picture({ raster }: FigurePanel, v: Viewport): string {
  const { href, x0, x1, y0, y1 } = raster!;
  const { sx, sy } = toScreen(v, { x: x0, y: y1 });
  return element('image', {
    x: sx,
    y: sy,
    width: (x1 - x0) * v.scale,
    height: (y1 - y0) * v.scale,
    preserveAspectRatio: 'none',
    href,
    style: v.scale >= PIXELS_SHOW ? 'image-rendering: pixelated' : undefined,
  });
}

function centre(at: ImagePoint, v: Viewport, { model, image }: FigureColours): string {
  const { sx, sy } = toScreen(v, at);
  const d = `M${short(sx - 5)} ${short(sy)}h10M${short(sx)} ${short(sy - 5)}v10`;
  return (
    element('path', { d, stroke: image, 'stroke-width': 3, opacity: 0.6 }) +
    element('path', { d, stroke: model, 'stroke-width': 1.2 })
  );
}

/** Beam, scale bar and directions along the lower edge of the last panel. */
function corner({ beam, furniture, colours }: Figure, v: Viewport): string[] {
  const parts: string[] = [];
  const below = v.height - INSET - 2;
  let right = v.width - INSET - 2;
  const reach = beam ? Math.max(...beam.map((p) => Math.max(Math.abs(p.x), Math.abs(p.y)))) * v.scale : 0;
  if (beam && reach >= 0.7 && reach <= Math.min(v.width, v.height) / 4) {
    const [sx, sy] = [right - reach, below - reach];
    const points = beam.map((p) => `${short(sx + p.x * v.scale)},${short(sy - p.y * v.scale)}`).join(' ');
    parts.push(
      element('polygon', {
        class: 'beam',
        points,
        fill: colours.image,
        stroke: colours.onImage,
        'stroke-width': 1,
      }),
    );
    right -= 2 * reach + 10;
  }
  const { bar, arrows } = furniture?.(v) ?? { bar: null, arrows: null };
  if (bar) {
    const width = Math.max(textWidth(bar.label, LETTER), bar.px);
    const left = right - width / 2 - bar.px / 2;
    const d = `M${short(left)} ${short(below - 4)}v4h${short(bar.px)}v-4`;
    const stroked = { d, fill: 'none' };
    parts.push(
      element('path', { ...stroked, stroke: colours.image, 'stroke-width': 3, opacity: 0.6 }),
      element('path', { ...stroked, class: 'scale-bar', stroke: colours.onImage, 'stroke-width': 1.2 }),
      onImage(bar.label, right - width / 2, below - 8, colours, { 'text-anchor': 'middle' }),
    );
  }
  if (arrows && v.width > 150) {
    const [sx, sy] = [v.width - INSET - 24, below - Math.max(2 * reach, 22) - 16];
    for (const [letter, { dx, dy }] of [
      ['N', arrows.north],
      ['E', arrows.east],
    ] as const) {
      const d = `M${short(sx)} ${short(sy)}l${short(dx * 16)} ${short(dy * 16)}`;
      parts.push(
        element('path', { d, stroke: colours.image, 'stroke-width': 3, opacity: 0.6 }),
        element('path', { d, stroke: colours.onImage, 'stroke-width': 1.2 }),
        onImage(letter, sx + dx * 23, sy + dy * 23 + LETTER * 0.36, colours, { 'text-anchor': 'middle' }),
      );
    }
  }
  return parts;
}
