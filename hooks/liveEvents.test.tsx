import type { Cube } from '@/shared/contract/cubes';
import type { LiveEvent } from '@/shared/contract/events';
import type { Fit } from '@/shared/contract/fits';
import { keys } from './keys';
import { isProgressOnly, listWithProgress, placesOf, staleAfter, withProgress } from './liveEvents';

const event = (part: Partial<LiveEvent> & Pick<LiveEvent, 'subject' | 'id'>): LiveEvent => ({
  regionId: 'r',
  ...part,
});

test('a finished fit makes its shell, the lists and every view of the catalogue stale, and nothing of other shells', () => {
  const stale = staleAfter(event({ subject: 'fit', id: 'f', shellId: 's' }));
  for (const key of [
    keys.fit('f'),
    keys.fits('s'),
    keys.shell('s'),
    keys.shells('r'),
    keys.catalogue(''),
    keys.catalogue('sort=age'),
  ])
    expect([key, stale(key)]).toEqual([key, true]);
  for (const key of [keys.fit('g'), keys.shell('t'), keys.cubes('r'), keys.reading('s'), undefined])
    expect([key, stale(key)]).toEqual([key, false]);
});

test('a changed region makes its companion images stale, and not its cubes', () => {
  const stale = staleAfter(event({ subject: 'region', id: 'r' }));
  expect([keys.region('r'), keys.images('r'), keys.images('q'), keys.cubes('r')].map(stale)).toEqual([
    true,
    true,
    false,
    false,
  ]);
});

test('a saved reading does not make the reading itself stale: its writer holds the newest state', () => {
  const stale = staleAfter(event({ subject: 'reading', id: 'x', shellId: 's' }));
  expect(stale(keys.reading('s'))).toBe(false);
  expect(stale(keys.shell('s'))).toBe(true);
});

test('progress alone is written into a cube; a change of status is asked for', () => {
  const cube = { id: 'c', status: 'ingesting', progress: 0.2, activity: 'reading' } as Cube;
  const progress = event({
    subject: 'cube',
    id: 'c',
    status: 'ingesting',
    progress: 0.4,
    activity: 'channel 12 of 30',
  });
  expect(isProgressOnly(progress, cube)).toBe(true);
  expect(withProgress(cube, progress)).toMatchObject({ progress: 0.4, activity: 'channel 12 of 30' });
  expect(isProgressOnly({ ...progress, status: 'ready' }, cube)).toBe(false);
  expect(isProgressOnly(progress, undefined)).toBe(false);
  expect(withProgress({ ...cube, id: 'd' }, progress)).toMatchObject({ progress: 0.2 });
});

test('the progress of a fit is written into the fit and its list; a finished one is asked for', () => {
  const fit = { id: 'f', shellId: 's', status: 'running', progress: 0.1, activity: 'fitting' } as Fit;
  const progress = event({
    subject: 'fit',
    id: 'f',
    shellId: 's',
    status: 'running',
    progress: 0.6,
    activity: 'draw 300 of 500',
  });
  expect(isProgressOnly(progress, fit)).toBe(true);
  expect(placesOf(progress)).toEqual({ record: keys.fit('f'), list: keys.fits('s') });
  const list = listWithProgress({ items: [fit, { ...fit, id: 'g' }], total: 2, next: null }, progress);
  expect(list.items.map((f) => f.progress)).toEqual([0.6, 0.1]);
  expect(list.items[0]!.activity).toBe('draw 300 of 500');
  expect(isProgressOnly({ ...progress, status: 'done' }, fit)).toBe(false);
  expect(isProgressOnly({ ...progress, subject: 'shell' }, fit)).toBe(false);
  expect(placesOf({ ...progress, subject: 'trace' })).toEqual({
    record: keys.trace('f'),
    list: keys.traces('s'),
  });
});

test('a traced rim makes the list of traces stale', () => {
  const stale = staleAfter(event({ subject: 'trace', id: 't', shellId: 's' }));
  for (const key of [keys.trace('t'), keys.traces('s'), keys.shell('s')]) expect(stale(key)).toBe(true);
  expect(stale(keys.traces('other'))).toBe(false);
});
