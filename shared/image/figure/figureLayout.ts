import { COLUMN_MM, UNIT_MM, type Figure, type Section } from '@/shared/image/figure/figure';
import type { GraticuleLine } from '@/shared/image/graticule';
import type { Viewport } from '@/shared/image/viewport';
import { textWidth, wrapped } from '@/shared/image/figure/textWidth';

/** Units: letters of numbers and captions, distance between things. */
export const LETTER = 12;
export const LINE = 15.5;
const GAP = 6;
const BETWEEN = 4;
const BAR_WIDTH = 10;
/** Tallest that pictures may be together: a page has 230 mm for figure and caption. */
const MOST_HEIGHT = 190 / UNIT_MM;

export interface PanelBox {
  left: number;
  top: number;
  /** Numbers of the axes stand at the left and below only where no picture follows. */
  hasLat: boolean;
  hasLon: boolean;
}

export interface FigureLayout {
  width: number;
  height: number;
  /** How the section lies in each panel, from the panel's upper left corner. */
  viewport: Viewport;
  panels: PanelBox[];
  /** Lines of coordinates; the same in every panel. */
  lines: GraticuleLine[];
  /** Around all panels. */
  field: { left: number; top: number; width: number; height: number };
  bar: { left: number; top: number; width: number; height: number } | null;
  caption: { lines: string[]; left: number; top: number };
}

/**
 * Where everything of a figure lies, in units of 0.2 mm.
 *
 * The width is that of the journal's column; pictures take what axes and colour bar leave of it, and the height follows
 * from the section's shape.
 *
 * @throws RangeError for a section without extent, or a figure without panels
 */
export function layFigure(figure: Figure): FigureLayout {
  const { columns, section, panels, perRow, bar, caption } = figure;
  if (!(section.x1 > section.x0 && section.y1 > section.y0) || panels.length === 0 || perRow < 1)
    throw new RangeError('A figure needs a panel and a section with width and height.');
  const width = COLUMN_MM[columns] / UNIT_MM;
  const across = Math.min(perRow, panels.length);
  const rows = Math.ceil(panels.length / across);
  const right = bar
    ? 2 * GAP + BAR_WIDTH + Math.max(...bar.ticks.map((t) => textWidth(t.label, LETTER)), 0) + LETTER + 8
    : GAP;
  const shape = (section.y1 - section.y0) / (section.x1 - section.x0);

  /** With the room that numbers at the left need, which depends on which there are. */
  const withLeft = (left: number) => {
    const room = width - left - right - (across - 1) * BETWEEN;
    const tallest = (MOST_HEIGHT - (rows - 1) * BETWEEN) / rows;
    const panelWidth = Math.min(room / across, tallest / shape);
    const viewport = viewportOf(figure, section, panelWidth);
    return { viewport, lines: figure.graticule?.(viewport) ?? [] };
  };
  const leftFor = (lines: readonly GraticuleLine[]) =>
    lines.length === 0
      ? GAP
      : LETTER + 2 * GAP + Math.max(...lines.map((l) => (l.axis === 'lat' ? textWidth(l.label, LETTER) : 0)));
  const left = leftFor(withLeft(60).lines);
  const { viewport, lines } = withLeft(left);

  const top = GAP;
  const [w, h] = [viewport.width, viewport.height];
  const field = {
    left,
    top,
    width: across * w + (across - 1) * BETWEEN,
    height: rows * h + (rows - 1) * BETWEEN,
  };
  const boxes = panels.map((_, i) => ({
    left: left + (i % across) * (w + BETWEEN),
    top: top + Math.floor(i / across) * (h + BETWEEN),
    hasLat: i % across === 0,
    hasLon: i + across >= panels.length,
  }));
  const belowField = top + field.height + (lines.length > 0 ? 2 * LINE + GAP : GAP);
  const captionLines = wrapped(caption, width - 2 * GAP, LETTER);
  const height = belowField + (captionLines.length > 0 ? GAP + captionLines.length * LINE : 0) + GAP;
  return {
    width,
    height,
    viewport,
    panels: boxes,
    lines,
    field,
    bar: bar && {
      left: left + field.width + GAP,
      top,
      width: BAR_WIDTH,
      height: Math.min(field.height, Math.max(h, 240)),
    },
    caption: { lines: captionLines, left: GAP, top: belowField + GAP + LETTER },
  };
}

/** A viewport that shows just the section. */
function viewportOf(image: { nx: number; ny: number }, s: Section, width: number): Viewport {
  const scale = width / (s.x1 - s.x0);
  return {
    nx: image.nx,
    ny: image.ny,
    width,
    height: (s.y1 - s.y0) * scale,
    x: (s.x0 + s.x1) / 2,
    y: (s.y0 + s.y1) / 2,
    scale,
  };
}

/** The part of the image that a map shows; null where it shows nothing of it. */
export function sectionOf(v: Viewport): Section | null {
  const [halfX, halfY] = [v.width / 2 / v.scale, v.height / 2 / v.scale];
  const section = {
    x0: Math.max(v.x - halfX, -0.5),
    x1: Math.min(v.x + halfX, v.nx - 0.5),
    y0: Math.max(v.y - halfY, -0.5),
    y1: Math.min(v.y + halfY, v.ny - 0.5),
  };
  return section.x1 > section.x0 && section.y1 > section.y0 ? section : null;
}

export const wholeImage = ({ nx, ny }: { nx: number; ny: number }): Section => ({
  x0: -0.5,
  x1: nx - 0.5,
  y0: -0.5,
  y1: ny - 0.5,
});
