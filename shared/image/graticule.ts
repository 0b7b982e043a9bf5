import { pathThrough, type Path, type Project } from '@/shared/image/skyPath';
import { decimalLabel, sexagesimalTicks } from '@/shared/image/sexagesimal';
import { niceTicks } from '@/shared/image/ticks';
import { toImage, toScreen, type ScreenPoint, type Viewport } from '@/shared/image/viewport';
import { wrap360, type LonLat } from '@/shared/sky/greatCircle';

export interface GraticuleLine {
  axis: 'lon' | 'lat';
  value: number;
  /** With its unit. */
  label: string;
  path: Path;
  /** Where the line leaves the map: longitudes below, latitudes on the left; null where it does not. */
  labelAt: ScreenPoint | null;
}

export interface SkyMapping {
  project: Project;
  unproject: (x: number, y: number) => LonLat | null;
}

/** Decimal degrees, or sexagesimal with longitudes in degrees or in hours. */
export type Notation = 'decimal' | 'sexagesimal' | 'hours';

const SAMPLES = 12;
const POINTS = 48;

/**
 * Lines of round longitudes and latitudes over what a map shows.
 *
 * The range comes from a grid of samples, with longitudes counted from the one nearest the middle, so that nothing
 * breaks at longitude 0; where the samples span most of a turn (a pole is in view) longitudes stand every 30 degrees.
 *
 * @param spacingPx wished distance between lines on the screen
 */
export function graticule(
  v: Viewport,
  sky: SkyMapping,
  notation: Notation = 'decimal',
  spacingPx = 130,
): GraticuleLine[] {
  const range = rangeOf(v, sky);
  if (!range) return [];
  const { lon, lat } = range;
  const wish = (size: number) => Math.max(2, size / spacingPx);
  const around = lon[1] - lon[0] > 180;
  const ticks = ([low, high]: readonly [number, number], count: number, hours: boolean) => {
    if (notation !== 'decimal') return sexagesimalTicks(low, high, count, hours ? 'hours' : 'degrees');
    const { values, decimals } = niceTicks(low, high, count);
    return { values, label: (value: number) => decimalLabel(value, decimals) };
  };
  const hours = notation === 'hours';
  const lons = around
    ? {
        values: Array.from({ length: 12 }, (_, i) => lon[0] + 30 * i - (lon[0] % 30)),
        label: (value: number) => (hours ? `${Math.round(value / 15)}ʰ` : decimalLabel(value, 0)),
      }
    : ticks(lon, wish(v.width), hours);
  const lats = ticks(lat, wish(v.height), false);
  const jump = Math.max(v.nx, v.ny) / 2;
  const margin = { lon: (lon[1] - lon[0]) * 0.2, lat: (lat[1] - lat[0]) * 0.2 };
  const run = (low: number, high: number, at: (value: number) => LonLat) =>
    pathThrough(
      Array.from({ length: POINTS + 1 }, (_, i) => at(low + ((high - low) * i) / POINTS)),
      sky.project,
      jump,
    );
  const bounded = (b: number) => Math.min(Math.max(b, -90), 90);
  const lines: GraticuleLine[] = [];
  for (const value of lons.values) {
    const path = run(bounded(lat[0] - margin.lat), bounded(lat[1] + margin.lat), (b) => ({
      lon: value,
      lat: b,
    }));
    const label = lons.label(wrap360(value));
    lines.push({ axis: 'lon', value: wrap360(value), label, path, labelAt: crossing(v, path, 'below') });
  }
  for (const value of lats.values) {
    if (Math.abs(value) >= 90) continue;
    const path = run(lon[0] - margin.lon, lon[1] + margin.lon, (l) => ({ lon: l, lat: value }));
    const label = lats.label(value);
    lines.push({ axis: 'lat', value, label, path, labelAt: crossing(v, path, 'left') });
  }
  return lines;
}

/** Longitudes (unwrapped about the middle) and latitudes that the visible part of the image covers. */
function rangeOf(v: Viewport, sky: SkyMapping) {
  const places: LonLat[] = [];
  for (let j = 0; j <= SAMPLES; j++)
    for (let i = 0; i <= SAMPLES; i++) {
      const at = toImage(v, { sx: (v.width * i) / SAMPLES, sy: (v.height * j) / SAMPLES });
      const x = Math.min(Math.max(at.x, -0.5), v.nx - 0.5);
      const y = Math.min(Math.max(at.y, -0.5), v.ny - 0.5);
      const place = sky.unproject(x, y);
      if (place) places.push(place);
    }
  const middle = places[Math.floor(places.length / 2)];
  if (!middle) return null;
  const lons = places.map((p) => middle.lon + (wrap360(p.lon - middle.lon + 180) - 180));
  const lats = places.map((p) => p.lat);
  return {
    lon: [Math.min(...lons), Math.max(...lons)] as const,
    lat: [Math.min(...lats), Math.max(...lats)] as const,
  };
}

/** Where a path first meets the lower or the left edge of the visible image. */
function crossing(v: Viewport, path: Path, edge: 'below' | 'left'): ScreenPoint | null {
  const corner = toScreen(v, { x: -0.5, y: -0.5 });
  const at = edge === 'below' ? Math.min(v.height, corner.sy) : Math.max(0, corner.sx);
  for (const piece of path)
    for (let i = 1; i < piece.length; i++) {
      const p = toScreen(v, piece[i - 1]!);
      const q = toScreen(v, piece[i]!);
      const [from, to] = edge === 'below' ? [p.sy, q.sy] : [p.sx, q.sx];
      if (from === to || (from - at) * (to - at) > 0) continue;
      const t = (at - from) / (to - from);
      const point = { sx: p.sx + t * (q.sx - p.sx), sy: p.sy + t * (q.sy - p.sy) };
      const along = edge === 'below' ? point.sx / v.width : point.sy / v.height;
      if (along > 0.02 && along < 0.98) return point;
    }
  return null;
}
