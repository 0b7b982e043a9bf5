/**
 * How an image lies on the screen. The only place that knows of the half pixel (pixel centres are whole numbers, so
 * the image reaches from −½ to n − ½) and of the direction of y (up in the image, down on the screen).
 *
 * Points: image {x, y} in pixels, screen {sx, sy} in CSS pixels from the upper left corner of the map.
 */
export interface Viewport {
  /** Pixels of the image. */
  nx: number;
  ny: number;
  /** Size of the map on the screen. */
  width: number;
  height: number;
  /** The image point in the middle of the map. */
  x: number;
  y: number;
  /** Screen pixels per image pixel. */
  scale: number;
}

export interface ImagePoint {
  x: number;
  y: number;
}
export interface ScreenPoint {
  sx: number;
  sy: number;
}

/** Closest and farthest look, against the scale at which the image just fits. */
const FARTHEST = 0.5;
/** An image pixel is never drawn larger than this, unless the image fits so. */
const LARGEST_PIXEL = 48;

export function toScreen(v: Viewport, { x, y }: ImagePoint): ScreenPoint {
  return { sx: v.width / 2 + (x - v.x) * v.scale, sy: v.height / 2 - (y - v.y) * v.scale };
}

export function toImage(v: Viewport, { sx, sy }: ScreenPoint): ImagePoint {
  return { x: v.x + (sx - v.width / 2) / v.scale, y: v.y - (sy - v.height / 2) / v.scale };
}

/** The scale at which the whole image is seen. */
export const fitScale = (v: Pick<Viewport, 'nx' | 'ny' | 'width' | 'height'>): number =>
  Math.min(v.width / v.nx, v.height / v.ny);

/** Zoom as a person reads it: 1 when the image just fits. */
export const zoomOf = (v: Viewport): number => v.scale / fitScale(v);

/** The whole image in the middle of the map. */
export function fitted(nx: number, ny: number, width: number, height: number): Viewport {
  return {
    nx,
    ny,
    width,
    height,
    x: (nx - 1) / 2,
    y: (ny - 1) / 2,
    scale: fitScale({ nx, ny, width, height }),
  };
}

/**
 * Bring a viewport back into bounds: the scale between half the fitting one and pixels of 48, the image in the middle
 * while it is smaller than the map, and its edge never further in than a quarter of the map.
 */
export function clamped(v: Viewport): Viewport {
  const fit = fitScale(v);
  const scale = Math.min(Math.max(v.scale, fit * FARTHEST), Math.max(LARGEST_PIXEL, fit));
  // The room past the edge grows from nothing at the fitting scale, so that zooming out comes to rest in the middle.
  const loose = Math.min(Math.max(scale / fit - 1, 0), 1);
  const along = (n: number, at: number, size: number) => {
    const room = Math.min((Math.max(n * scale - size, 0) / 2 + (loose * size) / 4) / scale, n / 2);
    const middle = (n - 1) / 2;
    return Math.min(Math.max(at, middle - room), middle + room);
  };
  return { ...v, scale, x: along(v.nx, v.x, v.width), y: along(v.ny, v.y, v.height) };
}

/** Zoom by a factor so that the image point under `at` stays there (as far as the bounds allow). */
export function zoomedAbout(v: Viewport, factor: number, at: ScreenPoint): Viewport {
  const bounded = clamped({ ...v, scale: v.scale * factor }).scale;
  const fixed = toImage(v, at);
  return clamped({
    ...v,
    scale: bounded,
    x: fixed.x - (at.sx - v.width / 2) / bounded,
    y: fixed.y + (at.sy - v.height / 2) / bounded,
  });
}

/** Move the picture by screen pixels. */
export const panned = (v: Viewport, dsx: number, dsy: number): Viewport =>
  clamped({ ...v, x: v.x - dsx / v.scale, y: v.y + dsy / v.scale });

/** The same place at the same zoom on a map of another size. */
export function resized(v: Viewport, width: number, height: number): Viewport {
  const scale = zoomOf(v) * fitScale({ ...v, width, height });
  return clamped({ ...v, width, height, scale });
}

/** Show a place at a zoom: what an address names. */
export const looking = (v: Viewport, x: number, y: number, zoom: number): Viewport =>
  clamped({ ...v, x, y, scale: zoom * fitScale(v) });

/** Where the image's upper left corner lies on the screen, and its size there. */
export function imageRect(v: Viewport): { left: number; top: number; width: number; height: number } {
  const corner = toScreen(v, { x: -0.5, y: v.ny - 0.5 });
  return { left: corner.sx, top: corner.sy, width: v.nx * v.scale, height: v.ny * v.scale };
}

/** The pixel an image point lies in; null outside the image. */
export function pixelAt(
  v: Pick<Viewport, 'nx' | 'ny'>,
  { x, y }: ImagePoint,
): { i: number; j: number } | null {
  const i = Math.floor(x + 0.5);
  const j = Math.floor(y + 0.5);
  return i >= 0 && j >= 0 && i < v.nx && j < v.ny ? { i, j } : null;
}

/** The nearest point of the image itself: a mark may not lie outside. */
export const within = (v: Pick<Viewport, 'nx' | 'ny'>, { x, y }: ImagePoint): ImagePoint => ({
  x: Math.min(Math.max(x, -0.5), v.nx - 0.5),
  y: Math.min(Math.max(y, -0.5), v.ny - 0.5),
});
