import type { Path } from '@/shared/image/skyPath';
import { toScreen, type Viewport } from '@/shared/image/viewport';

function trace(ctx: CanvasRenderingContext2D, path: Path, v: Viewport): void {
  ctx.beginPath();
  for (const piece of path)
    piece.forEach((point, i) => {
      const { sx, sy } = toScreen(v, point);
      if (i === 0) ctx.moveTo(sx, sy);
      else ctx.lineTo(sx, sy);
    });
}

/** Draw a path in image pixels as a line. */
export function stroke(
  ctx: CanvasRenderingContext2D,
  path: Path,
  v: Viewport,
  colour: string,
  width: number,
  alpha = 1,
): void {
  trace(ctx, path, v);
  ctx.globalAlpha = alpha;
  ctx.strokeStyle = colour;
  ctx.lineWidth = width;
  ctx.stroke();
  ctx.globalAlpha = 1;
}

/** A circle as the current path. */
export function disc(ctx: CanvasRenderingContext2D, sx: number, sy: number, r: number): void {
  ctx.beginPath();
  ctx.arc(sx, sy, r, 0, 2 * Math.PI);
}

/** Stroke the current path over a dark edge, which holds on bright gas. */
export function twice(ctx: CanvasRenderingContext2D, colour: string, edge: string, width: number): void {
  ctx.strokeStyle = edge;
  ctx.lineWidth = width + 2.5;
  ctx.stroke();
  ctx.strokeStyle = colour;
  ctx.lineWidth = width;
  ctx.stroke();
}
