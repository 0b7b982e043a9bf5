import type { SceneColours } from '@/components/map/scene';
import { stroke, twice } from '@/components/map/strokes';
import type { PictureLayers } from '@/shared/image/pictureLayers';
import { toScreen, type ImagePoint, type Viewport } from '@/shared/image/viewport';

type Draw = (ctx: CanvasRenderingContext2D, sx: number, sy: number) => void;

/**
 * Draw the layers under the person's own marks. Shape tells them apart, besides colour: lozenges were found in the
 * brightness, small crosses were not, squares are marks that a fit froze, dashed rings belong to other shells.
 */
export function drawLayers(
  ctx: CanvasRenderingContext2D,
  layers: PictureLayers,
  v: Viewport,
  c: SceneColours,
): void {
  const each = (places: readonly ImagePoint[], shape: Draw, colour: string, alpha: number) => {
    ctx.globalAlpha = alpha;
    for (const place of places) {
      const { sx, sy } = toScreen(v, place);
      shape(ctx, sx, sy);
      twice(ctx, colour, c.edge, 1.5);
    }
    ctx.globalAlpha = 1;
  };
  ctx.font = c.font;
  ctx.textBaseline = 'middle';
  for (const { name, path, at } of layers.shells) {
    ctx.setLineDash([2, 4]);
    stroke(ctx, path, v, c.model, 1.5, 0.9);
    ctx.setLineDash([]);
    if (!at) continue;
    const { sx, sy } = toScreen(v, at);
    const width = ctx.measureText(name).width;
    ctx.fillStyle = c.shade;
    ctx.fillRect(sx - width / 2 - 3, sy - 8, width + 6, 16);
    ctx.fillStyle = c.model;
    ctx.fillText(name, sx - width / 2, sy + 1);
  }
  each(layers.missed, crossAt, c.text, 0.6);
  each(layers.traced, lozengeAt, c.text, 1);
  each(layers.frozen, squareAt, c.person, 1);
}

const lozengeAt: Draw = (ctx, sx, sy) => {
  ctx.beginPath();
  ctx.moveTo(sx, sy - 5);
  ctx.lineTo(sx + 4, sy);
  ctx.lineTo(sx, sy + 5);
  ctx.lineTo(sx - 4, sy);
  ctx.closePath();
};
const squareAt: Draw = (ctx, sx, sy) => {
  ctx.beginPath();
  ctx.rect(sx - 4, sy - 4, 8, 8);
};
const crossAt: Draw = (ctx, sx, sy) => {
  ctx.beginPath();
  ctx.moveTo(sx - 3, sy - 3);
  ctx.lineTo(sx + 3, sy + 3);
  ctx.moveTo(sx + 3, sy - 3);
  ctx.lineTo(sx - 3, sy + 3);
};
