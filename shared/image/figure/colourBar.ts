import type { FigureBar } from '@/shared/image/figure/figure';
import { labelOf, niceTicks } from '@/shared/image/ticks';
import { TONE_CURVES, type Look } from '@/shared/image/tone';

const COLOURS = 48;
const TICKS = 6;

/** The colour bar of a look: evenly along the palette, so that a tone shows in how its numbers are spaced. */
export function colourBar(look: Look, name: string): FigureBar {
  const { ramp, tone } = look;
  const [low, high] = look.window;
  const colours = Array.from({ length: COLOURS }, (_, i) =>
    cssOf(ramp[Math.round((i * (ramp.length - 1)) / (COLOURS - 1))]!),
  );
  const { values, decimals } = niceTicks(low, high, TICKS);
  const size = Math.max(Math.abs(low), Math.abs(high));
  const scientific = size !== 0 && (size < 1e-3 || size >= 1e5);
  const ticks =
    high > low
      ? values.map((value) => ({
          at: TONE_CURVES[tone].forward(Math.min(Math.max((value - low) / (high - low), 0), 1)),
          label: scientific ? powerLabel(value) : labelOf(value, decimals),
        }))
      : [];
  return { colours, ticks, name };
}

const powerLabel = (value: number): string =>
  value === 0
    ? '0'
    : String(Number(value.toPrecision(3)).toExponential())
        .replace(/-/g, '−')
        .replace('e+', 'e');

/** A canvas pixel as CSS has it. */
const cssOf = (pixel: number): string =>
  `#${[pixel & 255, (pixel >> 8) & 255, (pixel >> 16) & 255].map((c) => c.toString(16).padStart(2, '0')).join('')}`;
