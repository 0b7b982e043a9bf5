import type { SWRConfiguration } from 'swr';
import { ApiProblem } from './api';

/** How the client keeps what the server knows: live events say when to ask again, so polling is not needed. */
export const cacheOptions: SWRConfiguration = {
  revalidateOnFocus: true,
  focusThrottleInterval: 15_000,
  dedupingInterval: 1_000,
  errorRetryInterval: 4_000,
  errorRetryCount: 5,
  /** A refusal stays a refusal; only a lost connection or a server at fault is worth asking again. */
  shouldRetryOnError: (error: unknown) =>
    error instanceof ApiProblem && (error.status === 0 || error.status >= 500),
};
