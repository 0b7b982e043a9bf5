import type { FitDraws } from '@/shared/contract/fits';
import { Problem } from '@/shared/contract/problem';
import { findDraws } from '../store/fits';
import type { Context } from './context';
import { fitFor } from './fits';

/** The draws as they are stored: float64, little-endian, whatever machine the worker ran on. */
export function toBytes(draws: Float64Array): Buffer {
  const bytes = Buffer.alloc(8 * draws.length);
  draws.forEach((value, i) => bytes.writeDoubleLE(value, 8 * i));
  return bytes;
}

/** One row a draw. JSON knows no infinity: null is a draw in which the parameter ran to its bound. */
export function toRows(bytes: Buffer, columns: number): (number | null)[][] {
  const at = (i: number) => {
    const value = bytes.readDoubleLE(8 * i);
    return Number.isFinite(value) ? value : null;
  };
  return Array.from({ length: bytes.length / (8 * columns) }, (_, row) =>
    Array.from({ length: columns }, (__, column) => at(row * columns + column)),
  );
}

export async function drawsOf(ctx: Context, id: string): Promise<FitDraws> {
  const row = await fitFor(ctx, id, 'shell.read');
  const bytes = await findDraws(ctx.db, id);
  if (row.outcome === null || bytes === null)
    throw new Problem(
      'not-found',
      row.outcome === null
        ? `This fit is ${row.status}. Its draws are here once it is done.`
        : 'This fit was made without the bootstrap, so there are no draws. Fit the reading again with options.bootstrap above 0.',
    );
  const { names } = row.outcome.correlation;
  return { names, rows: toRows(bytes, names.length) };
}
