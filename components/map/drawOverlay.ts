import type { Scene, SceneColours, SceneMark } from '@/components/map/scene';
import { drawLayers } from '@/components/map/drawLayers';
import { drawFurniture } from '@/components/map/drawFurniture';
import { disc, stroke, twice } from '@/components/map/strokes';
import type { GraticuleLine } from '@/shared/image/graticule';
import type { Path } from '@/shared/image/skyPath';
import { imageRect, toScreen, type ImagePoint, type Viewport } from '@/shared/image/viewport';

/** Draw everything that lies over the map: lines of coordinates below, marks above. */
export function drawOverlay(
  ctx: CanvasRenderingContext2D,
  scene: Scene,
  v: Viewport,
  colours: SceneColours,
  ratio: number,
  crosshair: ImagePoint | null,
): void {
  ctx.setTransform(ratio, 0, 0, ratio, 0, 0);
  ctx.clearRect(0, 0, v.width, v.height);
  ctx.lineJoin = 'round';
  const lines = scene.graticule?.(v) ?? [];
  const rect = imageRect(v);
  ctx.save();
  ctx.beginPath();
  ctx.rect(rect.left, rect.top, rect.width, rect.height);
  ctx.clip();
  for (const line of lines) stroke(ctx, line.path, v, colours.text, 1, 0.16);
  ctx.restore();
  for (const line of scene.contours ?? [])
    stroke(ctx, line.path, v, colours.text, line.strong ? 1.6 : 1, 0.75);
  if (scene.layers) drawLayers(ctx, scene.layers, v, colours);
  if (scene.ownRing) {
    ctx.setLineDash([5, 4]);
    edged(ctx, scene.ownRing, v, colours.person, 1.5, colours.edge);
    ctx.setLineDash([]);
  }
  if (scene.modelRing) edged(ctx, scene.modelRing, v, colours.model, 2, colours.edge);
  if (scene.centre) drawCentre(ctx, toScreen(v, scene.centre), colours);
  for (const mark of scene.marks) if (mark.away !== 0) drawFaint(ctx, mark, v, colours);
  for (const mark of scene.marks) if (mark.away === 0) drawMark(ctx, mark, v, colours);
  drawLabels(ctx, lines, v, colours);
  const beamRoom = scene.beam ? drawBeam(ctx, scene.beam, v, colours) : 0;
  if (scene.furniture)
    drawFurniture(ctx, scene.furniture(v), v, colours, { above: LABEL_ROOM, right: beamRoom });
  if (crosshair) drawCrosshair(ctx, toScreen(v, crosshair), colours);
}

/** A line with a dark edge, which holds on bright gas. */
function edged(
  ctx: CanvasRenderingContext2D,
  path: Path,
  v: Viewport,
  colour: string,
  width: number,
  edge: string,
): void {
  stroke(ctx, path, v, edge, width + 2.5, 0.55);
  stroke(ctx, path, v, colour, width);
}

function drawMark(ctx: CanvasRenderingContext2D, mark: SceneMark, v: Viewport, colours: SceneColours): void {
  const { sx, sy } = toScreen(v, mark);
  disc(ctx, sx, sy, 5.5);
  ctx.fillStyle = mark.unsure ? colours.edge : colours.person;
  ctx.fill();
  ctx.strokeStyle = colours.edge;
  ctx.lineWidth = mark.unsure ? 4 : 2;
  ctx.stroke();
  if (mark.unsure) {
    ctx.strokeStyle = colours.person;
    ctx.lineWidth = 2;
    ctx.stroke();
    ctx.strokeStyle = colours.edge;
  }
  if (!mark.selected) return;
  disc(ctx, sx, sy, 10.5);
  ctx.lineWidth = 4;
  ctx.stroke();
  ctx.strokeStyle = colours.text;
  ctx.lineWidth = 2;
  ctx.stroke();
}

function drawFaint(ctx: CanvasRenderingContext2D, mark: SceneMark, v: Viewport, colours: SceneColours): void {
  const { sx, sy } = toScreen(v, mark);
  disc(ctx, sx, sy, Math.abs(mark.away) === 1 ? 3.5 : 2.5);
  ctx.globalAlpha = Math.abs(mark.away) === 1 ? 0.75 : 0.5;
  ctx.strokeStyle = colours.edge;
  ctx.lineWidth = 3;
  ctx.stroke();
  ctx.strokeStyle = colours.person;
  ctx.lineWidth = 1.25;
  ctx.stroke();
  ctx.globalAlpha = 1;
}

function cross(ctx: CanvasRenderingContext2D, sx: number, sy: number, from: number, to: number): void {
  ctx.beginPath();
  for (const [dx, dy] of [
    [1, 0],
    [-1, 0],
    [0, 1],
    [0, -1],
  ] as const) {
    ctx.moveTo(sx + dx * from, sy + dy * from);
    ctx.lineTo(sx + dx * to, sy + dy * to);
  }
}

function drawCentre(ctx: CanvasRenderingContext2D, at: { sx: number; sy: number }, c: SceneColours): void {
  cross(ctx, at.sx, at.sy, 0, 6);
  twice(ctx, c.model, c.edge, 1.5);
}

function drawCrosshair(ctx: CanvasRenderingContext2D, at: { sx: number; sy: number }, c: SceneColours): void {
  cross(ctx, at.sx, at.sy, 5, 18);
  twice(ctx, c.text, c.edge, 1.5);
}

function drawLabels(
  ctx: CanvasRenderingContext2D,
  lines: readonly GraticuleLine[],
  v: Viewport,
  c: SceneColours,
): void {
  ctx.font = c.font;
  ctx.textBaseline = 'middle';
  for (const { axis, label: text, labelAt } of lines) {
    if (!labelAt) continue;
    const width = ctx.measureText(text).width;
    const left =
      axis === 'lat' ? labelAt.sx + 6 : Math.min(Math.max(labelAt.sx - width / 2, 4), v.width - width - 4);
    const middle = axis === 'lat' ? Math.min(Math.max(labelAt.sy, 12), v.height - 30) : labelAt.sy - 14;
    ctx.fillStyle = c.shade;
    ctx.fillRect(left - 3, middle - 8, width + 6, 16);
    ctx.fillStyle = c.text;
    ctx.fillText(text, left, middle + 1);
  }
}

/** Labels of longitudes stand along the lower edge; the beam stays above them. */
const LABEL_ROOM = 32;

/** Returns the room it takes from the right edge. */
function drawBeam(
  ctx: CanvasRenderingContext2D,
  outline: readonly ImagePoint[],
  v: Viewport,
  c: SceneColours,
): number {
  const reach = Math.max(...outline.map((p) => Math.max(Math.abs(p.x), Math.abs(p.y)))) * v.scale;
  if (reach < 1.5 || reach > Math.min(v.width, v.height) / 4) return 0;
  const rect = imageRect(v);
  const right = Math.min(v.width, rect.left + rect.width);
  const below = Math.min(v.height, rect.top + rect.height);
  const [sx, sy] = [right - reach - 12, below - reach - LABEL_ROOM];
  ctx.beginPath();
  outline.forEach((p, i) => {
    const [x, y] = [sx + p.x * v.scale, sy - p.y * v.scale];
    if (i === 0) ctx.moveTo(x, y);
    else ctx.lineTo(x, y);
  });
  ctx.closePath();
  ctx.fillStyle = c.shade;
  ctx.fill();
  twice(ctx, c.text, c.edge, 1.25);
  return 2 * reach + 12;
}
