import type { Figure } from '@/shared/image/figure/figure';
import { LETTER, type FigureLayout } from '@/shared/image/figure/figureLayout';
import { element, words } from '@/shared/image/figure/svg';
import { textWidth } from '@/shared/image/figure/textWidth';

/** The colour bar: what brightness each colour is. */
export const barParts = {
  defs({ bar }: Figure): string[] {
    if (!bar) return [];
    const last = bar.colours.length - 1;
    const stops = bar.colours.map((colour, i) => element('stop', { offset: i / last, 'stop-color': colour }));
    return [element('linearGradient', { id: 'bar', x1: 0, x2: 0, y1: 1, y2: 0 }, stops)];
  },

  drawn({ bar, colours }: Figure, { bar: box }: FigureLayout): string[] {
    if (!bar || !box) return [];
    const { left, top, width, height } = box;
    const right = left + width;
    let lastAbove = Infinity;
    const ticks = [...bar.ticks]
      .sort((a, b) => a.at - b.at)
      .flatMap(({ at, label }) => {
        const y = top + height * (1 - at);
        const line = element('line', {
          x1: right,
          x2: right + 3,
          y1: y,
          y2: y,
          stroke: colours.text,
          'stroke-width': 0.8,
        });
        if (lastAbove - y < LETTER + 1) return [line];
        lastAbove = y;
        const middle = Math.min(Math.max(y + LETTER * 0.36, top + LETTER * 0.8), top + height);
        return [line, words(label, right + 5, middle)];
      });
    const widest = Math.max(...bar.ticks.map((t) => textWidth(t.label, LETTER)), 0);
    const [x, y] = [right + 5 + widest + LETTER, top + height / 2];
    return [
      element('rect', {
        x: left,
        y: top,
        width,
        height,
        fill: 'url(#bar)',
        stroke: colours.text,
        'stroke-width': 0.8,
      }),
      ...ticks,
      words(bar.name, x, y, {
        'text-anchor': 'middle',
        transform: `rotate(-90 ${x.toFixed(3)} ${y.toFixed(3)})`,
      }),
    ];
  },
};
