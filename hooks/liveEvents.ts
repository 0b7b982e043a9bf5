import type { Cube } from '@/shared/contract/cubes';
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
      return exactly(keys.regions(), keys.region(event.id));
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

/** True for an event that says only how far a cube is: it can be written into what is shown, without asking again. */
export const isProgressOnly = (event: LiveEvent, shown: Cube | undefined): boolean =>
  event.subject === 'cube' &&
  event.progress !== undefined &&
  shown !== undefined &&
  shown.status === (event.status ?? shown.status);

/** The cube with an event's progress and words in it. */
export const withProgress = (cube: Cube, event: LiveEvent): Cube =>
  cube.id !== event.id
    ? cube
    : {
        ...cube,
        progress: event.progress ?? cube.progress,
        activity: event.activity === undefined ? cube.activity : event.activity,
      };

export const listWithProgress = (list: List<Cube>, event: LiveEvent): List<Cube> => ({
  ...list,
  items: list.items.map((cube) => withProgress(cube, event)),
});
