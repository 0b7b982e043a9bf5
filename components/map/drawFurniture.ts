import type { Furniture, ScreenStep } from '@/components/map/furniture';
import type { SceneColours } from '@/components/map/scene';
import { twice } from '@/components/map/strokes';
import { imageRect, type Viewport } from '@/shared/image/viewport';

const ARROW = 20;
const EDGE = 12;

/** Scale bar and directions in the lower right corner, clear of labels and beam. */
export function drawFurniture(
  ctx: CanvasRenderingContext2D,
  { bar, arrows }: Furniture,
  v: Viewport,
  c: SceneColours,
  room: { above: number; right: number },
): void {
  const rect = imageRect(v);
  const right = Math.min(v.width, rect.left + rect.width) - EDGE - room.right;
  const below = Math.min(v.height, rect.top + rect.height) - room.above;
  if (right < 160 || below < 120) return; // hardly anything of the picture is in sight
  ctx.font = c.font;
  ctx.textBaseline = 'middle';
  if (bar) {
    const width = Math.max(ctx.measureText(bar.label).width, bar.px);
    ctx.fillStyle = c.shade;
    ctx.fillRect(right - width - 6, below - 26, width + 10, 30);
    ctx.fillStyle = c.text;
    ctx.textAlign = 'center';
    ctx.fillText(bar.label, right - width / 2, below - 16);
    ctx.textAlign = 'left';
    const left = right - width / 2 - bar.px / 2;
    ctx.beginPath();
    ctx.moveTo(left, below - 7);
    ctx.lineTo(left, below - 3);
    ctx.lineTo(left + bar.px, below - 3);
    ctx.lineTo(left + bar.px, below - 7);
    twice(ctx, c.text, c.edge, 1.25);
  }
  if (!arrows) return;
  const at = { sx: right - 24, sy: below - 64 };
  drawArrow(ctx, at, arrows.north, 'N', c);
  drawArrow(ctx, at, arrows.east, 'E', c);
}

function drawArrow(
  ctx: CanvasRenderingContext2D,
  { sx, sy }: { sx: number; sy: number },
  { dx, dy }: ScreenStep,
  letter: string,
  c: SceneColours,
): void {
  const [x, y] = [sx + dx * ARROW, sy + dy * ARROW];
  ctx.beginPath();
  ctx.moveTo(sx, sy);
  ctx.lineTo(x, y);
  for (const side of [1, -1]) {
    ctx.moveTo(x, y);
    ctx.lineTo(x - 5 * dx + side * 3 * dy, y - 5 * dy - side * 3 * dx);
  }
  twice(ctx, c.text, c.edge, 1.25);
  ctx.textAlign = 'center';
  ctx.lineWidth = 3;
  ctx.strokeStyle = c.edge;
  ctx.strokeText(letter, x + dx * 9, y + dy * 9);
  ctx.fillStyle = c.text;
  ctx.fillText(letter, x + dx * 9, y + dy * 9);
  ctx.textAlign = 'left';
}
