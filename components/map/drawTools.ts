import type { SceneColours } from '@/components/map/scene';
import type { RingOnMap, ToolScene } from '@/components/map/toolScene';
import { disc, stroke, twice } from '@/components/map/strokes';
import { toScreen, type ImagePoint, type Viewport } from '@/shared/image/viewport';

/** Draw what the tools lay over the map: a ring or a lasso being drawn, and marks that are offered. */
export function drawTools(
  ctx: CanvasRenderingContext2D,
  tools: ToolScene,
  { ring, lasso }: { ring: RingOnMap | null; lasso: readonly ImagePoint[] | null },
  v: Viewport,
  c: SceneColours,
): void {
  for (const other of tools.others) drawOther(ctx, other, v, c);
  for (const ghost of tools.ghosts) drawGhost(ctx, ghost, v, c);
  if (ring) drawRing(ctx, ring, v, c);
  if (lasso && lasso.length > 1) drawLasso(ctx, lasso, v, c);
}

/** An offered mark: a broken circle, so that it is not taken for one. */
function drawGhost(ctx: CanvasRenderingContext2D, at: ImagePoint, v: Viewport, c: SceneColours): void {
  const { sx, sy } = toScreen(v, at);
  ctx.setLineDash([3, 2.5]);
  disc(ctx, sx, sy, 6);
  twice(ctx, c.person, c.edge, 1.75);
  ctx.setLineDash([]);
  disc(ctx, sx, sy, 1.25);
  ctx.fillStyle = c.person;
  ctx.fill();
}

function drawOther(ctx: CanvasRenderingContext2D, at: ImagePoint, v: Viewport, c: SceneColours): void {
  const { sx, sy } = toScreen(v, at);
  ctx.beginPath();
  ctx.rect(sx - 5, sy - 5, 10, 10);
  twice(ctx, c.text, c.edge, 1.5);
}

function drawRing(ctx: CanvasRenderingContext2D, ring: RingOnMap, v: Viewport, c: SceneColours): void {
  ctx.setLineDash([2, 5]);
  stroke(ctx, ring.erased, v, c.text, 1.5, 0.6);
  ctx.setLineDash([]);
  stroke(ctx, ring.seen, v, c.edge, 4.5, 0.6);
  stroke(ctx, ring.seen, v, c.person, 2);
  for (const mark of ring.marks) {
    const { sx, sy } = toScreen(v, mark);
    disc(ctx, sx, sy, 4.5);
    ctx.fillStyle = c.edge;
    ctx.fill();
    ctx.strokeStyle = c.person;
    ctx.lineWidth = 1.75;
    ctx.stroke();
  }
  if (ring.centre) {
    const { sx, sy } = toScreen(v, ring.centre);
    disc(ctx, sx, sy, 7);
    twice(ctx, c.person, c.edge, 1.75);
    ctx.beginPath();
    ctx.moveTo(sx - 4, sy);
    ctx.lineTo(sx + 4, sy);
    ctx.moveTo(sx, sy - 4);
    ctx.lineTo(sx, sy + 4);
    twice(ctx, c.person, c.edge, 1.5);
  }
  if (ring.handle) {
    const { sx, sy } = toScreen(v, ring.handle);
    disc(ctx, sx, sy, 8);
    ctx.fillStyle = c.person;
    ctx.fill();
    ctx.strokeStyle = c.edge;
    ctx.lineWidth = 2;
    ctx.stroke();
  }
}

function drawLasso(
  ctx: CanvasRenderingContext2D,
  line: readonly ImagePoint[],
  v: Viewport,
  c: SceneColours,
): void {
  ctx.beginPath();
  line.forEach((point, i) => {
    const { sx, sy } = toScreen(v, point);
    if (i === 0) ctx.moveTo(sx, sy);
    else ctx.lineTo(sx, sy);
  });
  ctx.closePath();
  ctx.globalAlpha = 0.14;
  ctx.fillStyle = c.person;
  ctx.fill();
  ctx.globalAlpha = 1;
  ctx.setLineDash([6, 4]);
  twice(ctx, c.person, c.edge, 1.5);
  ctx.setLineDash([]);
}
