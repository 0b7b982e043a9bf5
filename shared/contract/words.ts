/** Words that the API and the screens share, free of zod so that a screen may load them. */

export const SHELL_STATUS = ['draft', 'in review', 'returned', 'accepted', 'withdrawn'] as const;
export type ShellStatus = (typeof SHELL_STATUS)[number];

/** What the catalogue can be ordered by. */
export const CATALOGUE_SORT = [
  'name',
  'designation',
  'region',
  'l',
  'b',
  'theta',
  'radius',
  'vSys',
  'vExp',
  'age',
  'quality',
  'status',
] as const;
export type CatalogueSort = (typeof CATALOGUE_SORT)[number];
