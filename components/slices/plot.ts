import { labelOf, niceTicks } from '@/shared/image/ticks';

/** Where a plot's inside lies, px. */
export interface PlotBox {
  left: number;
  top: number;
  width: number;
  height: number;
}
export interface PlotAxis {
  low: number;
  high: number;
  /** With its unit. */
  name: string;
}
export interface PlotColours {
  text: string;
  line: string;
  font: string;
}

export const boxOf = (width: number, height: number): PlotBox => ({
  left: 52,
  top: 8,
  width: Math.max(width - 60, 10),
  height: Math.max(height - 44, 10),
});

export const xOn = (box: PlotBox, axis: PlotAxis, value: number): number =>
  box.left + ((value - axis.low) / (axis.high - axis.low)) * box.width;
export const yOn = (box: PlotBox, axis: PlotAxis, value: number): number =>
  box.top + (1 - (value - axis.low) / (axis.high - axis.low)) * box.height;

/** Frame, ticks, numbers and names of two axes. */
export function drawAxes(
  ctx: CanvasRenderingContext2D,
  box: PlotBox,
  across: PlotAxis,
  up: PlotAxis,
  c: PlotColours,
): void {
  ctx.strokeStyle = c.line;
  ctx.fillStyle = c.text;
  ctx.lineWidth = 1;
  ctx.font = c.font;
  ctx.strokeRect(box.left, box.top, box.width, box.height);
  ctx.textBaseline = 'middle';
  ctx.textAlign = 'right';
  const ups = niceTicks(up.low, up.high, Math.max(2, box.height / 44));
  for (const value of ups.values) {
    const y = yOn(box, up, value);
    ctx.beginPath();
    ctx.moveTo(box.left - 4, y);
    ctx.lineTo(box.left, y);
    ctx.stroke();
    ctx.fillText(labelOf(value, ups.decimals), box.left - 6, y);
  }
  ctx.textAlign = 'center';
  const acrosses = niceTicks(across.low, across.high, Math.max(2, box.width / 80));
  const below = box.top + box.height;
  for (const value of acrosses.values) {
    const x = xOn(box, across, value);
    ctx.beginPath();
    ctx.moveTo(x, below);
    ctx.lineTo(x, below + 4);
    ctx.stroke();
    ctx.fillText(labelOf(value, acrosses.decimals), x, below + 12);
  }
  ctx.fillText(across.name, box.left + box.width / 2, below + 28);
  ctx.save();
  ctx.translate(10, box.top + box.height / 2);
  ctx.rotate(-Math.PI / 2);
  ctx.fillText(up.name, 0, 0);
  ctx.restore();
  ctx.textAlign = 'left';
}
