import { CATALOGUE_SORT, SHELL_STATUS, type CatalogueSort, type ShellStatus } from '@/shared/contract/words';

export type SortKey = CatalogueSort;
/** What the catalogue's address carries: the same words as the API's query, so that a link and a script agree. */
export interface Filters {
  sort: SortKey;
  order: 'up' | 'down';
  region: string[];
  status: ShellStatus[];
  search: string;
  vExpMin: string;
  vExpMax: string;
  radiusMin: string;
  radiusMax: string;
  /** Shells picked for comparison. */
  pick: string[];
}
export type AddressParams = Record<string, string | string[] | undefined>;

export const RANGES = ['vExpMin', 'vExpMax', 'radiusMin', 'radiusMax'] as const;
/** Side by side on a screen. */
export const MOST_PICKED = 4;

const list = (value: string | string[] | undefined): string[] =>
  (Array.isArray(value) ? value : (value ?? '').split(',')).flatMap((v) => v.split(',')).filter(Boolean);
const one = (value: string | string[] | undefined): string => (Array.isArray(value) ? value[0] : value) ?? '';
const numeric = (text: string): string =>
  text.trim() !== '' && Number.isFinite(Number(text)) ? text.trim() : '';

/** Reads an address; what does not make sense there is as if it were not given. */
export function filtersOf(params: AddressParams): Filters {
  const sort = one(params.sort) as SortKey;
  return {
    sort: CATALOGUE_SORT.includes(sort) ? sort : 'designation',
    order: one(params.order) === 'down' ? 'down' : 'up',
    region: list(params.region),
    status: list(params.status).filter((s): s is ShellStatus =>
      (SHELL_STATUS as readonly string[]).includes(s),
    ),
    search: one(params.search).slice(0, 80),
    vExpMin: numeric(one(params.vExpMin)),
    vExpMax: numeric(one(params.vExpMax)),
    radiusMin: numeric(one(params.radiusMin)),
    radiusMax: numeric(one(params.radiusMax)),
    pick: list(params.pick).slice(0, MOST_PICKED),
  };
}

/** The address of these filters; what is as usual is left out (undefined takes a parameter away). */
export const addressOf = (f: Filters): Record<string, string | undefined> => ({
  sort: f.sort === 'designation' ? undefined : f.sort,
  order: f.order === 'up' ? undefined : f.order,
  region: f.region.join(',') || undefined,
  status: f.status.join(',') || undefined,
  search: f.search || undefined,
  ...Object.fromEntries(RANGES.map((key) => [key, f[key] || undefined])),
  pick: f.pick.join(',') || undefined,
});

/** The query of GET /shells and /shells.csv. */
export function queryOf(f: Filters): string {
  const query = new URLSearchParams({ sort: f.sort, order: f.order });
  for (const id of f.region) query.append('region', id);
  for (const status of f.status) query.append('status', status);
  if (f.search.trim()) query.set('search', f.search.trim());
  for (const key of RANGES) if (f[key]) query.set(key, f[key]);
  query.set('limit', '500');
  return query.toString();
}

/** How many filters narrow the list; sorting and picking do not. */
export const narrowing = (f: Filters): number =>
  f.region.length + f.status.length + (f.search.trim() ? 1 : 0) + RANGES.filter((key) => f[key]).length;

/** Sorting by a column again turns it round. */
export const sortedBy = (f: Filters, key: SortKey): Filters => ({
  ...f,
  sort: key,
  order: f.sort === key && f.order === 'up' ? 'down' : 'up',
});

export const toggled = <T>(values: readonly T[], value: T): T[] =>
  values.includes(value) ? values.filter((v) => v !== value) : [...values, value];
