import { listOf } from './common';
import { Fit, FitDraft, FitDraws, FrozenMarks } from './fits';
import { Reading, ReadingDraft } from './readings';
import { CatalogueQuery, Distance, DistanceDraft, Shell, ShellChange, ShellDraft } from './shells';
import { Trace, TraceDraft } from './traces';
import type { Endpoint } from './endpoint';

export const SHELL_ENDPOINTS: readonly Endpoint[] = [
  {
    method: 'get',
    path: '/regions/:regionId/shells',
    summary: 'Shells of a region',
    answer: { status: 200, schema: listOf(Shell) },
  },
  {
    method: 'post',
    path: '/regions/:regionId/shells',
    summary: 'Name a shell',
    body: ShellDraft,
    answer: { status: 201, schema: Shell },
  },
  {
    method: 'get',
    path: '/shells',
    summary: 'The catalogue: filter, sort, page',
    query: CatalogueQuery,
    answer: { status: 200, schema: listOf(Shell) },
  },
  {
    method: 'get',
    path: '/shells.csv',
    summary: 'The catalogue as CSV',
    query: CatalogueQuery,
    answer: { status: 200, binary: 'text/csv' },
  },
  { method: 'get', path: '/shells/:shellId', summary: 'A shell', answer: { status: 200, schema: Shell } },
  {
    method: 'patch',
    path: '/shells/:shellId',
    summary: 'Rename, annotate, withdraw, adopt a fit',
    body: ShellChange,
    answer: { status: 200, schema: Shell },
  },
  {
    method: 'delete',
    path: '/shells/:shellId',
    summary: 'Take a shell out of the lists; can be undone',
    answer: { status: 204 },
  },
  {
    method: 'post',
    path: '/shells/:shellId/restore',
    summary: 'Undo taking a shell out',
    answer: { status: 200, schema: Shell },
  },

  {
    method: 'get',
    path: '/shells/:shellId/readings/mine',
    summary: 'My marks',
    answer: { status: 200, schema: Reading },
  },
  {
    method: 'put',
    path: '/shells/:shellId/readings/mine',
    summary: 'Save my marks; a stale revision answers 409 with both sides',
    body: ReadingDraft,
    answer: { status: 200, schema: Reading },
  },

  {
    method: 'get',
    path: '/shells/:shellId/fits',
    summary: 'Fits of record, newest first',
    answer: { status: 200, schema: listOf(Fit) },
  },
  {
    method: 'post',
    path: '/shells/:shellId/fits',
    summary: 'Freeze a reading and queue a fit',
    body: FitDraft,
    answer: { status: 202, schema: Fit },
  },
  { method: 'get', path: '/fits/:fitId', summary: 'A fit', answer: { status: 200, schema: Fit } },
  {
    method: 'get',
    path: '/fits/:fitId/marks',
    summary: 'The frozen marks of a fit',
    answer: { status: 200, schema: FrozenMarks },
  },
  {
    method: 'get',
    path: '/fits/:fitId/draws',
    summary: 'The draws of the bootstrap',
    answer: { status: 200, schema: FitDraws },
  },
  {
    method: 'post',
    path: '/fits/:fitId/cancel',
    summary: 'Stop a fit',
    answer: { status: 202, schema: Fit },
  },
  {
    method: 'post',
    path: '/fits/:fitId/retry',
    summary: 'Run a failed or cancelled fit again',
    answer: { status: 202, schema: Fit },
  },

  {
    method: 'get',
    path: '/shells/:shellId/traces',
    summary: 'Rims traced from the brightness, newest first',
    answer: { status: 200, schema: listOf(Trace) },
  },
  {
    method: 'post',
    path: '/shells/:shellId/traces',
    summary: 'Trace the rim around a fit',
    body: TraceDraft,
    answer: { status: 202, schema: Trace },
  },
  {
    method: 'get',
    path: '/traces/:traceId',
    summary: 'A traced rim',
    answer: { status: 200, schema: Trace },
  },
  {
    method: 'post',
    path: '/traces/:traceId/cancel',
    summary: 'Stop tracing',
    answer: { status: 202, schema: Trace },
  },

  {
    method: 'get',
    path: '/shells/:shellId/distances',
    summary: 'Distance entries, newest first; the newest one holds',
    answer: { status: 200, schema: listOf(Distance) },
  },
  {
    method: 'post',
    path: '/shells/:shellId/distances',
    summary: 'Enter a distance',
    body: DistanceDraft,
    answer: { status: 201, schema: Distance },
  },
];
