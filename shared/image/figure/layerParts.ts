import type { FigureColours } from '@/shared/image/figure/figure';
import { edged, onImage } from '@/shared/image/figure/strokes';
import { element, short } from '@/shared/image/figure/svg';
import type { PictureLayers } from '@/shared/image/pictureLayers';
import { toScreen, type ImagePoint, type Viewport } from '@/shared/image/viewport';

/** Signs about their place: lozenges were found in the brightness, crosses were not, squares are marks that a fit froze. */
const SIGNS = {
  traced: 'm0 -4.4l3.5 4.4l-3.5 4.4l-3.5 -4.4z',
  missed: 'm-2.6 -2.6l5.2 5.2m0 -5.2l-5.2 5.2',
  frozen: 'm-3.4 -3.4h6.8v6.8h-6.8z',
} as const;

/** The layers of a picture, to lie under the marks and rings of its own. */
export function layerParts(layers: PictureLayers, v: Viewport, c: FigureColours): string[] {
  const signs = (name: keyof typeof SIGNS, colour: string) => {
    const d = layers[name].map((at) => place(at, v) + SIGNS[name]).join('');
    if (d === '') return [];
    const path = { d, fill: 'none', 'stroke-linejoin': 'round' };
    return [
      element('path', { ...path, stroke: c.image, 'stroke-width': 2.8, opacity: 0.6 }),
      element('path', { ...path, class: `layer-${name}`, stroke: colour, 'stroke-width': 1.1 }),
    ];
  };
  const rings = layers.shells.flatMap(({ name, path, at }) => {
    const look = { class: 'ring-other', stroke: c.model, 'stroke-width': 1.3, 'stroke-dasharray': '2 4' };
    const ring = edged(path, v, c, look);
    if (!at) return ring;
    const { sx, sy } = toScreen(v, at);
    return [...ring, onImage(name, sx, sy, c, { fill: c.model, 'text-anchor': 'middle' })];
  });
  return [
    ...rings,
    ...signs('missed', c.onImage),
    ...signs('traced', c.onImage),
    ...signs('frozen', c.person),
  ];
}

function place(at: ImagePoint, v: Viewport): string {
  const { sx, sy } = toScreen(v, at);
  return `M${short(sx)} ${short(sy)}`;
}
