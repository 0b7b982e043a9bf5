import type { FigureColours } from '@/shared/image/figure/figure';
import { element, short, words, type Attributes } from '@/shared/image/figure/svg';
import type { Path } from '@/shared/image/skyPath';
import { toScreen, type Viewport } from '@/shared/image/viewport';

const trace = (path: Path, v: Viewport): string =>
  path
    .map((piece) =>
      piece
        .map((point, i) => {
          const { sx, sy } = toScreen(v, point);
          return `${i === 0 ? 'M' : 'L'}${short(sx)} ${short(sy)}`;
        })
        .join(''),
    )
    .join('');

/** A path of image pixels. */
export const line = (path: Path, v: Viewport, look: Attributes): string =>
  element('path', { d: trace(path, v), fill: 'none', 'stroke-linejoin': 'round', ...look });

/** A line over a dark edge, which holds on bright gas. */
export const edged = (path: Path, v: Viewport, { image }: FigureColours, look: Attributes): string[] => [
  line(path, v, { stroke: image, 'stroke-width': Number(look['stroke-width']) + 1.8, opacity: 0.55 }),
  line(path, v, look),
];

/** Letters on a picture, with an edge that keeps them legible on any ground. */
export const onImage = (
  text: string,
  x: number,
  y: number,
  c: FigureColours,
  more: Attributes = {},
): string =>
  words(text, x, y, {
    fill: c.onImage,
    stroke: c.image,
    'stroke-width': 2.6,
    'stroke-linejoin': 'round',
    'paint-order': 'stroke',
    ...more,
  });
