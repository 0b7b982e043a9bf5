import type { LeftOut } from '@/shared/contract/fits';
import { plainNumber } from '@/shared/physics/quantity';
import { signed, writtenName } from './parameterWords';

/** The largest shift in a sentence: which channel carries most, or that none does. */
export function mostMoved(rows: readonly LeftOut[]): string {
  const shifts = rows.flatMap((row) =>
    Object.entries(row.shiftInSe).flatMap(([name, shift]) =>
      shift === null ? [] : [{ name, shift, velocity: row.velocity }],
    ),
  );
  const failed = rows.filter((r) => r.problem).length;
  const lost =
    failed > 0
      ? ` Without ${failed === 1 ? 'one of the channels' : `each of ${failed} channels`} there is no fit at all.`
      : '';
  const largest = shifts.reduce<(typeof shifts)[number] | null>(
    (a, b) => (a === null || Math.abs(b.shift) > Math.abs(a.shift) ? b : a),
    null,
  );
  if (largest === null) return `No channel could be left out.${lost}`;
  if (Math.abs(largest.shift) < 1)
    return `No parameter moves by a standard error when any one channel is left out.${lost}`;
  return (
    `The channel at ${plainNumber(largest.velocity)} km/s carries most: without it ${writtenName(largest.name)} moves by ` +
    `${signed(largest.shift)} standard errors.${lost}`
  );
}
