import { labelOf } from '@/shared/image/ticks';

/** Digits after the point that tell neighbouring pixels apart, with one to spare. */
export const coordinateDigits = (degreesPerPixel: number): number =>
  Math.min(Math.max(Math.ceil(-Math.log10(Math.max(degreesPerPixel, 1e-9))) + 1, 1), 6);

export const degrees = (value: number, digits: number): string => `${labelOf(value, digits)}°`;

/** Brightness to about three digits, as readouts and window ends need it. */
export function brightness(value: number): string {
  if (!Number.isFinite(value)) return 'no value';
  const size = Math.abs(value);
  if (size !== 0 && (size < 1e-3 || size >= 1e5)) return value.toExponential(2).replace(/-/g, '−');
  const digits = size >= 100 ? 0 : size >= 10 ? 1 : size >= 1 ? 2 : 3;
  return labelOf(value, digits);
}

/** The window's ends on one chip: “2.5–27 K”; with a minus sign beside it a dash could be taken for one. */
export const windowWords = ([low, high]: readonly [number, number], unit: string | null): string =>
  `${trimmed(low)}${low < 0 || high < 0 ? ' to ' : '–'}${trimmed(high)}${unit ? ` ${unit}` : ''}`;

const trimmed = (value: number): string => {
  const text =
    Math.abs(value) >= 1e4 ? brightness(value) : labelOf(Number(value.toPrecision(2)), places(value));
  return text.includes('.') ? text.replace(/0+$/, '').replace(/\.$/, '') : text;
};
const places = (value: number): number =>
  value === 0 ? 0 : Math.min(Math.max(1 - Math.floor(Math.log10(Math.abs(value))), 0), 6);

const FRAMES: Record<string, { lon: string; lat: string; name: string }> = {
  galactic: { lon: 'l', lat: 'b', name: 'galactic' },
  icrs: { lon: 'α', lat: 'δ', name: 'ICRS' },
  fk5: { lon: 'α', lat: 'δ', name: 'FK5' },
  fk4: { lon: 'α', lat: 'δ', name: 'FK4' },
  'fk4-no-e': { lon: 'α', lat: 'δ', name: 'FK4' },
};

/** Signs and name of a cube's own frame. */
export const frameWords = (frame: string) => FRAMES[frame] ?? { lon: 'lon', lat: 'lat', name: frame };
