/** Rows as aligned columns: the first to the left, figures to the right. */
export function table(rows: readonly (readonly string[])[]): string {
  const widths: number[] = [];
  for (const row of rows) row.forEach((cell, i) => (widths[i] = Math.max(widths[i] ?? 0, cell.length)));
  const line = (row: readonly string[]) =>
    row.map((cell, i) => (i === 0 ? cell.padEnd(widths[0]!) : cell.padStart(widths[i]!))).join('   ');
  return rows.map((row) => line(row).trimEnd()).join('\n');
}

/** The value below which a share of the values lies; share 0.5 is the median. */
export function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  const at = share * (sorted.length - 1);
  const low = sorted[Math.floor(at)] ?? NaN;
  return low + (at % 1) * ((sorted[Math.ceil(at)] ?? NaN) - low);
}

export const median = (values: readonly number[]): number => quantile(values, 0.5);

export const verdict = (value: number, limit: number): string => (value < limit ? 'PASS' : 'FAIL');

export const seconds = (s: number): string => `${s.toFixed(2)} s`;
export const milliseconds = (ms: number): string => `${ms.toFixed(ms < 100 ? 1 : 0)} ms`;
