import type { Cube } from '@/shared/contract/cubes';
import type { LiveEvent } from '@/shared/contract/events';
import { keys } from './keys';
import { isProgressOnly, staleAfter, withProgress } from './liveEvents';

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
