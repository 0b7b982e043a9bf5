import useSWR from 'swr';
import type { Cube } from '@/shared/contract/cubes';
import type { Region } from '@/shared/contract/regions';
import type { Shell } from '@/shared/contract/shells';
import { api, asProblem } from './api';
import { keys } from './keys';
import { useRegions } from './useRegions';
import type { List, Read } from './useRead';

export interface Inbox {
  failed: Cube[];
  reading: Cube[];
  /** My shells that carry marks of mine and have no adopted fit. */
  unfitted: Shell[];
  /** Regions with fits under way. */
  fitting: Region[];
  regionNames: Record<string, string>;
}

async function collect(regions: readonly Region[]): Promise<Inbox> {
  const withCubes = regions.filter((r) => r.waiting.ingesting + r.waiting.failedCubes > 0);
  const withShells = regions.filter((r) => r.waiting.unfitted > 0);
  const [cubes, shells] = await Promise.all([
    Promise.all(withCubes.map((r) => api<List<Cube>>(keys.cubes(r.id)))),
    Promise.all(withShells.map((r) => api<List<Shell>>(keys.shells(r.id)))),
  ]);
  const allCubes = cubes.flatMap((list) => list.items);
  return {
    failed: allCubes.filter((c) => c.status === 'failed'),
    reading: allCubes.filter((c) => c.status === 'ingesting' || c.status === 'uploaded'),
    unfitted: shells.flatMap((list) => list.items).filter(isUnfitted),
    fitting: regions.filter((r) => r.waiting.runningFits > 0),
    regionNames: Object.fromEntries(regions.map((r) => [r.id, r.name])),
  };
}

/** A shell that waits for its reader: it carries marks of mine and no fit stands for it. */
export const isUnfitted = (shell: Shell): boolean =>
  shell.adoptedFitId === null &&
  shell.status !== 'withdrawn' &&
  shell.readings.some((r) => r.mine && r.marks > 0);

/** What waits in the team, from the regions' counts and, only where something waits, their lists. */
export function useInbox(): Read<Inbox> {
  const regions = useRegions();
  const items = regions.data?.items;
  const signature = items && JSON.stringify(items.map((r) => [r.id, r.updatedAt, r.waiting]));
  const { data, error, isLoading, mutate } = useSWR(
    signature ? ['inbox', signature] : null,
    () => collect(items ?? []),
    { keepPreviousData: true },
  );
  const failure = regions.problem ?? (error === undefined ? null : asProblem(error));
  return {
    data,
    problem: failure,
    waiting: !failure && (regions.waiting || (isLoading && data === undefined)),
    reload: () => Promise.all([regions.reload(), mutate()]),
  };
}

/** How many things somebody must act on: failed cubes and shells without an adopted fit. */
export function useInboxCount(): number {
  const { data } = useInbox();
  return data ? data.failed.length + data.unfitted.length : 0;
}
