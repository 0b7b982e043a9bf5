import type { GraticuleLine } from '@/shared/image/graticule';
import type { PictureLayers } from '@/shared/image/pictureLayers';
import type { Path } from '@/shared/image/skyPath';
import type { ImagePoint, Viewport } from '@/shared/image/viewport';

/** Millimetres of one unit of a figure: a letter of 12 units is one of 6.8 points on the page. */
export const UNIT_MM = 0.2;

/** Widths of a journal's page, millimetres. */
export const COLUMN_MM = { 1: 88, 2: 180 } as const;
export type Columns = keyof typeof COLUMN_MM;

/** A part of an image, in image pixels; pixel centres are whole numbers, so a whole image reaches from −½ to n − ½. */
export interface Section {
  x0: number;
  x1: number;
  y0: number;
  y1: number;
}

/** A painted picture and the part of the image that it covers. */
export interface FigureRaster extends Section {
  /** Data URL. */
  href: string;
}

export interface FigureMark extends ImagePoint {
  unsure?: boolean;
  /** Of a channel beside the one shown. */
  faint?: boolean;
}

/** One picture with what lies on it, in image pixels. */
export interface FigurePanel {
  raster: FigureRaster | null;
  /** In its upper left corner, as the velocity. */
  label: string;
  marks: readonly FigureMark[];
  modelRing: Path | null;
  ownRing: Path | null;
  centre: ImagePoint | null;
  contours?: readonly { path: Path; strong: boolean }[];
  layers?: PictureLayers;
}

export interface FigureColours {
  ground: string;
  text: string;
  quiet: string;
  /** Behind pictures, and about letters on them. */
  image: string;
  onImage: string;
  person: string;
  model: string;
}

export interface FigureBar {
  /** Colours from the low to the high end, as CSS has them. */
  colours: readonly string[];
  /** Places of round values along it: 0 at the low end, 1 at the high end. */
  ticks: readonly { at: number; label: string }[];
  /** What it tells, with the unit. */
  name: string;
}

export interface Figure {
  columns: Columns;
  colours: FigureColours;
  /** `css` is put into the file: the face that the family names. */
  font: { family: string; css: string };
  /** Pixels of the image and the part of it that is shown. */
  nx: number;
  ny: number;
  section: Section;
  /** One, or several in rows. */
  panels: readonly FigurePanel[];
  /** Pictures in a row; of one panel: 1. */
  perRow: number;
  graticule: ((v: Viewport) => GraticuleLine[]) | null;
  axisNames: { lon: string; lat: string };
  /** The beam's outline about (0, 0), image pixels. */
  beam: readonly ImagePoint[] | null;
  furniture: ((v: Viewport) => FigureFurniture) | null;
  bar: FigureBar | null;
  /** What the picture is of, in the upper right corner of the first panel. */
  source: string;
  /** Paragraphs are kept; empty for none. */
  caption: string;
}

export interface FigureFurniture {
  bar: { px: number; label: string } | null;
  arrows: { north: { dx: number; dy: number }; east: { dx: number; dy: number } } | null;
}
