import useSWR, { type SWRConfiguration } from 'swr';
import { api, asProblem, type ApiProblem } from './api';

/** What every data hook returns: never a stand-in object, so that waiting, failed and empty stay apart. */
export interface Read<T> {
  data: T | undefined;
  problem: ApiProblem | null;
  /** Nothing to show yet. */
  waiting: boolean;
  /** Asks again, also after a problem. */
  reload: () => Promise<unknown>;
}
export interface List<T> {
  items: T[];
  total: number;
  next: string | null;
}

/** Reads one resource by its key; null reads nothing yet. */
export function useRead<T>(
  key: string | null,
  options?: SWRConfiguration<T>,
  read: (path: string) => Promise<T> = api,
): Read<T> {
  const { data, error, isLoading, mutate } = useSWR<T>(key, read, options);
  return {
    data,
    problem: error === undefined ? null : asProblem(error),
    waiting: isLoading && data === undefined,
    reload: () => mutate(),
  };
}
