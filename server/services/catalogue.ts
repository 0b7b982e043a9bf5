import { createHash } from 'node:crypto';
import { Problem } from '@/shared/contract/problem';
import type { CatalogueQuery, Shell } from '@/shared/contract/shells';
import { listCatalogue } from '../store/shells';
import { requireTeam } from './access';
import type { Context } from './context';
import { toShell } from './shells';

export interface CataloguePage {
  items: Shell[];
  total: number;
  next: string | null;
}

/**
 * The catalogue of the team. Radius and age are derived from the adopted fit and the distance of the moment, so
 * filters and order on them are applied here; what is stored is filtered by the database.
 */
export async function catalogue(ctx: Context, query: CatalogueQuery): Promise<CataloguePage> {
  const all = await everyRow(ctx, query);
  const start = query.cursor ? decode(query.cursor, query) : 0;
  const end = start + query.limit;
  return {
    items: all.slice(start, end),
    total: all.length,
    next: end < all.length ? encode(end, query) : null,
  };
}

/** All rows that pass the filters, in order: what the CSV download holds. */
export async function everyRow(ctx: Context, query: CatalogueQuery): Promise<Shell[]> {
  const found = await listCatalogue(ctx.db, requireTeam(ctx.actor), {
    regions: asList(query.region),
    statuses: asList(query.status),
    search: query.search?.trim() || null,
    adopted: query.adopted,
  });
  const within = (value: number | undefined, low: number | undefined, high: number | undefined) =>
    (low === undefined && high === undefined) ||
    (value !== undefined && value >= (low ?? -Infinity) && value <= (high ?? Infinity));
  return found
    .map((row) => toShell(row, ctx.actor))
    .filter(
      (s) =>
        within(s.adopted?.vExp.value, query.vExpMin, query.vExpMax) &&
        within(s.adopted?.radius?.value, query.radiusMin, query.radiusMax),
    )
    .sort(byKey(query));
}

type Key = string | number | null | undefined;
const KEYS: Record<CatalogueQuery['sort'], (s: Shell) => Key> = {
  name: (s) => s.name.toLowerCase(),
  designation: (s) => s.designation,
  region: (s) => s.regionName.toLowerCase(),
  l: (s) => s.adopted?.l.value,
  b: (s) => s.adopted?.b.value,
  theta: (s) => s.adopted?.theta.value,
  radius: (s) => s.adopted?.radius?.value,
  vSys: (s) => s.adopted?.vSys.value,
  vExp: (s) => s.adopted?.vExp.value,
  age: (s) => s.adopted?.age?.value,
  quality: (s) => s.adopted?.chi2PerDof,
  status: (s) => s.status,
};

/** Rows without the value come last in either order; ties are settled by id, so that pages do not overlap. */
function byKey({ sort, order }: CatalogueQuery) {
  const key = KEYS[sort];
  const sign = order === 'up' ? 1 : -1;
  return (a: Shell, b: Shell): number => {
    const x = key(a) ?? null;
    const y = key(b) ?? null;
    if (x === null || y === null) return x === y ? compare(a.id, b.id) : x === null ? 1 : -1;
    return sign * compare(x, y) || compare(a.id, b.id);
  };
}
const compare = <T extends string | number>(a: T, b: T) => (a < b ? -1 : a > b ? 1 : 0);

const asList = <T>(value: T | T[] | undefined): T[] | null =>
  value === undefined ? null : Array.isArray(value) ? value : [value];

// A cursor holds for the query it was made for: with another order or filter it would skip rows unseen.
const fingerprint = ({ cursor: _, limit: __, ...rest }: CatalogueQuery) =>
  createHash('sha256').update(JSON.stringify(rest)).digest('base64url').slice(0, 12);
const encode = (offset: number, query: CatalogueQuery) =>
  Buffer.from(`${offset}:${fingerprint(query)}`).toString('base64url');
function decode(cursor: string, query: CatalogueQuery): number {
  const [offset, print] = Buffer.from(cursor, 'base64url').toString().split(':');
  if (!/^\d+$/.test(offset ?? '') || print !== fingerprint(query))
    throw new Problem('invalid-input', 'This cursor belongs to another query. Begin again without it.', {
      field: 'cursor',
    });
  return Number(offset);
}
