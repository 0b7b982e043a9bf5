import type { LiveEvent } from '@/shared/contract/events';
import { isCatalogue, keys } from './keys';
import type { List } from './useRead';

type Matcher = (key: unknown) => boolean;
const exactly =
  (...wanted: (string | null | undefined | false)[]): Matcher =>
  (key) =>
    typeof key === 'string' && wanted.includes(key);

/** Which cached resources an event makes stale. */
export function staleAfter(event: LiveEvent): Matcher {
  const region = event.regionId;
  const regionKeys = [keys.regions(), region && keys.region(region)];
  const shellId = event.shellId ?? (event.subject === 'shell' ? event.id : null);
  const shellKeys = [shellId && keys.shell(shellId), region && keys.shells(region)];
  switch (event.subject) {
    case 'region':
      return exactly(keys.regions(), keys.region(event.id), keys.images(event.id));
    case 'upload':
      return exactly(...regionKeys, region && keys.uploads(region), region && keys.cubes(region));
    case 'cube':
      return exactly(...regionKeys, keys.cube(event.id), region && keys.cubes(region));
    case 'shell': {
      const own = exactly(...regionKeys, ...shellKeys, keys.fits(event.id), keys.distances(event.id));
      return (key) => own(key) || isCatalogue(key);
    }
    case 'reading':
      return exactly(...regionKeys, ...shellKeys);
    case 'trace':
      return exactly(...shellKeys, shellId && keys.traces(shellId), keys.trace(event.id));
    case 'fit': {
      const own = exactly(...regionKeys, ...shellKeys, keys.fit(event.id), shellId && keys.fits(shellId));
      return (key) => own(key) || isCatalogue(key);
    }
  }
}

/** What says of itself how far it is: a cube that is read, a fit that runs, a rim that is traced. */
export interface Running {
  id: string;
  status: string;
  progress: number | null;
  activity?: string | null;
}

/** True for an event that says only how far something is: it can be written into what is shown, without asking again. */
export const isProgressOnly = (event: LiveEvent, shown: Running | undefined): boolean =>
  (event.subject === 'cube' || event.subject === 'fit' || event.subject === 'trace') &&
  event.progress !== undefined &&
  shown !== undefined &&
  shown.status === (event.status ?? shown.status);

/** The record with an event's progress and words in it. */
export const withProgress = <T extends Running>(record: T, event: LiveEvent): T =>
  record.id !== event.id
    ? record
    : {
        ...record,
        progress: event.progress ?? record.progress,
        ...(event.activity !== undefined && { activity: event.activity }),
      };

export const listWithProgress = <T extends Running>(list: List<T>, event: LiveEvent): List<T> => ({
  ...list,
  items: list.items.map((record) => withProgress(record, event)),
});

/** Where an event's record and the list that holds it lie in the cache. */
export function placesOf(event: LiveEvent): { record: string; list: string | null } {
  if (event.subject === 'fit')
    return { record: keys.fit(event.id), list: event.shellId ? keys.fits(event.shellId) : null };
  if (event.subject === 'trace')
    return { record: keys.trace(event.id), list: event.shellId ? keys.traces(event.shellId) : null };
  return { record: keys.cube(event.id), list: event.regionId && keys.cubes(event.regionId) };
}
