import { COLUMN_MM, UNIT_MM, type Figure } from '@/shared/image/figure/figure';
import { axisNumbers, axisTitles } from '@/shared/image/figure/axes';
import { barParts } from '@/shared/image/figure/bar';
import { layFigure, LETTER, LINE } from '@/shared/image/figure/figureLayout';
import { panelParts } from '@/shared/image/figure/panel';
import { element, words } from '@/shared/image/figure/svg';

/** Points of ink between picture and frame. */
const FRAME = 0.8;

/**
 * A figure for a page as one SVG file that needs nothing else: pictures are in it as data, everything on them as lines.
 *
 * @returns the file's text; its width and height are in millimetres, its units 0.2 mm
 * @throws RangeError as `layFigure`
 */
export function figureSvg(figure: Figure): string {
  const layout = layFigure(figure);
  const { width, height, viewport: v, panels } = layout;
  const { colours, font } = figure;
  const clip = element(
    'clipPath',
    { id: 'panel' },
    element('rect', { x: 0, y: 0, width: v.width, height: v.height }),
  );
  const inside = panels.map(({ left, top }, i) =>
    element('g', { transform: `translate(${left.toFixed(3)} ${top.toFixed(3)})` }, [
      element(
        'g',
        { 'clip-path': 'url(#panel)' },
        panelParts(figure, figure.panels[i]!, layout, { first: i === 0, last: i === panels.length - 1 }),
      ),
      element('rect', {
        x: 0,
        y: 0,
        width: v.width,
        height: v.height,
        fill: 'none',
        stroke: colours.text,
        'stroke-width': FRAME,
      }),
      ...axisNumbers(layout, panels[i]!, colours),
    ]),
  );
  const caption = layout.caption.lines.map((line, i) =>
    words(line, layout.caption.left, layout.caption.top + i * LINE),
  );
  const text = element(
    'svg',
    {
      xmlns: 'http://www.w3.org/2000/svg',
      width: `${COLUMN_MM[figure.columns]}mm`,
      height: `${(height * UNIT_MM).toFixed(2)}mm`,
      viewBox: `0 0 ${width} ${height.toFixed(3)}`,
      'font-family': `'${font.family}', sans-serif`,
      'font-size': LETTER,
      fill: colours.text,
    },
    [
      element('title', {}, words(figure.source, 0, 0).replace(/<[^>]*>/g, '')),
      element('defs', {}, [font.css && element('style', {}, font.css), clip, ...barParts.defs(figure)]),
      element('rect', { x: 0, y: 0, width, height, fill: colours.ground }),
      ...inside,
      ...(layout.lines.length > 0 ? axisTitles(layout, figure) : []),
      ...barParts.drawn(figure, layout),
      ...caption,
    ],
  );
  return `<?xml version="1.0" encoding="UTF-8"?>\n${text}\n`;
}
