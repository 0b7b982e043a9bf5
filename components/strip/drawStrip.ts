import { seen, xOf, type StripLayout } from '@/components/strip/stripLayout';
import { positionOfVelocity, type StripOrder } from '@/components/strip/stripOrder';
import { labelOf, niceTicks } from '@/shared/image/ticks';

export interface StripPicture {
  image: CanvasImageSource;
  width: number;
  height: number;
  step: number;
}

export interface StripScene {
  layout: StripLayout;
  order: StripOrder;
  /** The position under the box; fractional while a film runs. */
  current: number;
  /** Thumbnails side by side in the order of the file, one for each `step` channels; null until loaded. */
  picture: StripPicture | null;
  /** Mean brightness of each channel, in the order of the file; null where there is none. */
  spectrum: readonly (number | null)[];
  /** Marks on each channel, by channel. */
  marks: ReadonlyMap<number, number>;
  /** The model's near cap, systemic velocity and far cap, km/s. */
  span: { low: number; middle: number; high: number } | null;
  /** Channels where marks would help most, the best first. */
  next: readonly number[];
}

export interface StripColours {
  image: string;
  text: string;
  quiet: string;
  person: string;
  model: string;
  edge: string;
  box: string;
  /** Of the small triangle above the box, which lies on the page's ground. */
  pointer: string;
  font: string;
  /** The page's own, under bracket and labels. */
  ground: string;
}

/** Heights from top to bottom, px. */
const SPECTRUM = 26;
const THUMBNAILS = 46;
const BRACKET = 12;
const LABELS = 18;
const TOP = SPECTRUM + 4;
export const STRIP_HEIGHT = TOP + THUMBNAILS + BRACKET + LABELS;

export function drawStrip(
  ctx: CanvasRenderingContext2D,
  s: StripScene,
  c: StripColours,
  ratio: number,
): void {
  ctx.setTransform(ratio, 0, 0, ratio, 0, 0);
  ctx.clearRect(0, 0, s.layout.width, STRIP_HEIGHT);
  ctx.lineJoin = 'round';
  drawThumbnails(ctx, s, c);
  drawSpectrum(ctx, s, c);
  drawMarks(ctx, s, c);
  drawBox(ctx, s, c);
  if (s.span) drawSpan(ctx, s, s.span, c);
  s.next.forEach((channel, rank) => drawNext(ctx, s, channel, rank === 0, c));
  drawLabels(ctx, s, c);
}

/** Draw one channel's thumbnail into a box, cut to the box's shape about its middle. */
function drawThumbnail(
  ctx: CanvasRenderingContext2D,
  s: StripScene,
  channel: number,
  left: number,
  width: number,
): void {
  if (!s.picture) return;
  const { image, height, step } = s.picture;
  const each = s.picture.width / Math.ceil(s.layout.count / step);
  const scale = Math.min(each / width, height / THUMBNAILS);
  const [w, h] = [width * scale, THUMBNAILS * scale];
  const from = Math.floor(channel / step) * each + (each - w) / 2;
  ctx.drawImage(image, from, (height - h) / 2, w, h, left, TOP, width, THUMBNAILS);
}

function drawThumbnails(ctx: CanvasRenderingContext2D, s: StripScene, c: StripColours): void {
  const { layout, order, current } = s;
  const [first, last] = seen(layout, current);
  const left = xOf(layout, -0.5, current);
  const right = xOf(layout, layout.count - 0.5, current);
  ctx.fillStyle = c.image;
  ctx.fillRect(Math.max(left, 0), TOP, Math.min(right, layout.width) - Math.max(left, 0), THUMBNAILS);
  const { cell } = layout;
  for (let p = first - (first % cell); p <= last; p += cell) {
    const width = Math.min(cell, layout.count - p) * layout.pitch;
    const channel = order.channels[Math.min(p + (cell >> 1), layout.count - 1)];
    if (channel !== undefined) drawThumbnail(ctx, s, channel, xOf(layout, p - 0.5, current), width - 1);
  }
}

function drawSpectrum(ctx: CanvasRenderingContext2D, s: StripScene, c: StripColours): void {
  const known = s.spectrum.filter((v): v is number => v !== null);
  const low = Math.min(...known);
  const high = Math.max(...known);
  if (!(high > low)) return;
  const [first, last] = seen(s.layout, s.current);
  ctx.beginPath();
  let pen = false;
  for (let p = first; p <= last; p++) {
    const value = s.spectrum[s.order.channels[p] ?? -1] ?? null;
    if (value === null) {
      pen = false;
      continue;
    }
    const x = xOf(s.layout, p, s.current);
    const y = SPECTRUM - 1 - ((value - low) / (high - low)) * (SPECTRUM - 4);
    if (pen) ctx.lineTo(x, y);
    else ctx.moveTo(x, y);
    pen = true;
  }
  ctx.strokeStyle = c.quiet;
  ctx.lineWidth = 1.5;
  ctx.stroke();
}

function drawMarks(ctx: CanvasRenderingContext2D, s: StripScene, c: StripColours): void {
  for (const channel of s.marks.keys()) {
    const position = s.order.positions[channel];
    if (position === undefined) continue;
    const x = xOf(s.layout, position, s.current);
    ctx.fillStyle = c.edge;
    ctx.fillRect(x - 2.5, TOP + THUMBNAILS - 10, 5, 10);
    ctx.fillStyle = c.person;
    ctx.fillRect(x - 1.5, TOP + THUMBNAILS - 9, 3, 9);
  }
}

/** The channel shown, with its own thumbnail at full width. */
function drawBox(ctx: CanvasRenderingContext2D, s: StripScene, c: StripColours): void {
  const { layout } = s;
  const position = Math.round(s.current);
  const channel = s.order.channels[position];
  if (channel === undefined) return;
  const width = Math.max(layout.pitch * layout.cell, 24);
  const x = xOf(layout, layout.film ? s.current : position, s.current);
  const left = Math.min(Math.max(x - width / 2, 1), layout.width - width - 1);
  ctx.fillStyle = c.image;
  ctx.fillRect(left, TOP, width, THUMBNAILS);
  drawThumbnail(ctx, s, channel, left, width);
  if (s.marks.has(channel)) {
    ctx.fillStyle = c.edge;
    ctx.fillRect(x - 2.5, TOP + THUMBNAILS - 10, 5, 10);
    ctx.fillStyle = c.person;
    ctx.fillRect(x - 1.5, TOP + THUMBNAILS - 9, 3, 9);
  }
  ctx.beginPath();
  ctx.roundRect(left, TOP - 1, width, THUMBNAILS + 2, 3);
  ctx.strokeStyle = c.edge;
  ctx.lineWidth = 4;
  ctx.stroke();
  ctx.strokeStyle = c.box;
  ctx.lineWidth = 2;
  ctx.stroke();
  ctx.fillStyle = c.pointer; // where exactly the channel lies, under a box wider than it
  ctx.beginPath();
  ctx.moveTo(x - 4, TOP - 7);
  ctx.lineTo(x + 4, TOP - 7);
  ctx.lineTo(x, TOP - 2);
  ctx.fill();
}

function drawSpan(
  ctx: CanvasRenderingContext2D,
  s: StripScene,
  span: NonNullable<StripScene['span']>,
  c: StripColours,
): void {
  const place = (v: number) => xOf(s.layout, positionOfVelocity(s.order, v), s.current);
  const [low, middle, high] = [place(span.low), place(span.middle), place(span.high)];
  const y = TOP + THUMBNAILS + 5.5;
  const [from, to] = [Math.max(low, 0), Math.min(high, s.layout.width)];
  if (from > to) return;
  ctx.beginPath();
  if (low >= 0) {
    ctx.moveTo(low, y + 6);
    ctx.lineTo(low, y);
  } else ctx.moveTo(0, y); // a span that leaves the strip stays open
  ctx.lineTo(to, y);
  if (high <= s.layout.width) ctx.lineTo(high, y + 6);
  ctx.moveTo(middle, y);
  ctx.lineTo(middle, y + 5);
  ctx.strokeStyle = c.model;
  ctx.lineWidth = 2;
  ctx.stroke();
}

/** A diamond on the bracket: full for the channel that would help most, open for the others. */
function drawNext(
  ctx: CanvasRenderingContext2D,
  s: StripScene,
  channel: number,
  best: boolean,
  c: StripColours,
): void {
  const position = s.order.positions[channel];
  if (position === undefined) return;
  const x = xOf(s.layout, position, s.current);
  const y = TOP + THUMBNAILS + 6;
  ctx.beginPath();
  ctx.moveTo(x, y - 5.5);
  ctx.lineTo(x + 5.5, y);
  ctx.lineTo(x, y + 5.5);
  ctx.lineTo(x - 5.5, y);
  ctx.closePath();
  ctx.fillStyle = best ? c.model : c.ground;
  ctx.fill();
  ctx.strokeStyle = c.model;
  ctx.lineWidth = 1.75;
  ctx.stroke();
}

function drawLabels(ctx: CanvasRenderingContext2D, s: StripScene, c: StripColours): void {
  const { layout, order, current } = s;
  const [first, last] = seen(layout, current);
  const [low, high] = [order.velocities[first], order.velocities[last]];
  if (low === undefined || high === undefined) return;
  ctx.font = c.font;
  ctx.textBaseline = 'alphabetic';
  ctx.textAlign = 'center';
  ctx.fillStyle = c.quiet;
  const { values, decimals } = niceTicks(low, high, Math.max(2, layout.width / 110));
  for (const v of values) {
    const x = xOf(layout, positionOfVelocity(order, v), current);
    const text = labelOf(v, decimals);
    const half = ctx.measureText(text).width / 2;
    if (x - half < 0 || x + half > layout.width) continue;
    ctx.fillText(text, x, STRIP_HEIGHT - 3);
    ctx.fillRect(x - 0.5, TOP + THUMBNAILS + 1, 1, 3);
  }
  ctx.textAlign = 'start';
}
