export interface Ticks {
  values: number[];
  step: number;
  /** Digits after the point that tell neighbouring ticks apart. */
  decimals: number;
}

/**
 * Round numbers between two ends: steps of 1, 2 or 5 times a power of ten, about `count` of them.
 *
 * @param low, high the ends, in any order; equal or not finite ends give no ticks
 * @param count how many are wished; between half and twice as many come back
 */
export function niceTicks(low: number, high: number, count: number): Ticks {
  const [from, to] = low < high ? [low, high] : [high, low];
  const span = to - from;
  if (!(span > 0) || !Number.isFinite(span)) return { values: [], step: 0, decimals: 0 };
  const rough = span / Math.max(count, 1);
  const power = Math.floor(Math.log10(rough));
  const lead = rough / 10 ** power;
  // Geometric means of 1, 2, 5, 10 are where one step turns into the next.
  const factor = lead < Math.SQRT2 ? 1 : lead < Math.sqrt(10) ? 2 : lead < Math.sqrt(50) ? 5 : 10;
  const decimals = Math.max(0, -(factor === 10 ? power + 1 : power));
  const step = factor * 10 ** power;
  const first = Math.ceil(from / step - 1e-9);
  const last = Math.floor(to / step + 1e-9);
  const values: number[] = [];
  // Rounded through text, so that 3 times 0.1 is 0.3.
  for (let k = first; k <= last; k++) values.push(Number((k * step).toFixed(decimals)) + 0);
  return { values, step, decimals };
}

/** A number as a label: a real minus sign, and never "−0". */
export function labelOf(value: number, decimals: number): string {
  const text = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(text) !== 0 ? `−${text}` : text;
}
