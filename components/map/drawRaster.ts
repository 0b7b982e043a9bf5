import { imageRect, type Viewport } from '@/shared/image/viewport';

export interface RasterPicture {
  /** The painted plane, first row the image's lowest. */
  canvas: HTMLCanvasElement;
  /** Image pixels along a side of one of its pixels. */
  block: number;
}

/** From this many screen pixels for one of the image on, pixels are shown as what they are. */
const PIXELS_SHOW = 12;

/** Draw the painted plane where the viewport wants it. `ratio` is device pixels per CSS pixel. */
export function drawRaster(
  ctx: CanvasRenderingContext2D,
  picture: RasterPicture | null,
  v: Viewport,
  ratio: number,
  blank: CanvasPattern | string,
): void {
  ctx.setTransform(ratio, 0, 0, ratio, 0, 0);
  ctx.clearRect(0, 0, v.width, v.height);
  const rect = imageRect(v);
  ctx.fillStyle = blank;
  ctx.fillRect(rect.left, rect.top, rect.width, rect.height);
  if (!picture) return;
  const { canvas, block } = picture;
  ctx.save();
  ctx.beginPath();
  ctx.rect(rect.left, rect.top, rect.width, rect.height); // a reduced plane's last block may reach past the edge
  ctx.clip();
  const sharp = block === 1 && v.scale >= PIXELS_SHOW;
  ctx.imageSmoothingEnabled = !sharp;
  ctx.imageSmoothingQuality = v.scale * block < 0.7 ? 'medium' : 'low';
  // The first row is the lowest: turn the picture over about the lower edge of the image.
  ctx.transform(v.scale, 0, 0, -v.scale, rect.left, rect.top + rect.height);
  ctx.drawImage(canvas, 0, 0, canvas.width * block, canvas.height * block);
  ctx.restore();
}

/** Hatching for pixels without a value, so that they are not taken for faint ones. */
export function hatching(
  ctx: CanvasRenderingContext2D,
  ground: string,
  line: string,
): CanvasPattern | string {
  const tile = document.createElement('canvas');
  tile.width = 8;
  tile.height = 8;
  const t = tile.getContext('2d');
  if (!t) return ground;
  t.fillStyle = ground;
  t.fillRect(0, 0, 8, 8);
  t.strokeStyle = line;
  t.globalAlpha = 0.16;
  t.beginPath();
  for (const d of [-8, 0, 8]) {
    t.moveTo(d, 8);
    t.lineTo(d + 8, 0);
  }
  t.stroke();
  return ctx.createPattern(tile, 'repeat') ?? ground;
}
