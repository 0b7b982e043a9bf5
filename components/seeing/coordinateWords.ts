import { sexagesimal } from '@/shared/image/sexagesimal';
import { labelOf } from '@/shared/image/ticks';

/** Which coordinates lines and readout speak in. */
export type Grid = 'galactic' | 'equatorial' | 'off';
export type Notation = 'decimal' | 'sexagesimal';

/**
 * A position to a tenth of a pixel and no finer.
 *
 * @param perPixel degrees from one pixel to the next
 */
export function coordinateWords(
  at: { lon: number; lat: number },
  grid: 'galactic' | 'equatorial',
  notation: Notation,
  perPixel: number,
): { lon: string; lat: string } {
  const digits = (step: number, most: number) =>
    Math.min(Math.max(Math.ceil(-Math.log10(Math.max(step, 1e-12) / 10)), 0), most);
  if (notation === 'decimal') {
    const d = Math.max(digits(perPixel, 6), 1);
    return { lon: `${labelOf(at.lon, d)}°`, lat: `${labelOf(at.lat, d)}°` };
  }
  const seconds = (perUnit: number) => digits(perPixel * perUnit, 3);
  const hours = grid === 'equatorial';
  return {
    lon: sexagesimal(at.lon, hours ? 'hours' : 'degrees', seconds(hours ? 240 : 3600)),
    lat: sexagesimal(at.lat, 'degrees', seconds(3600)),
  };
}
