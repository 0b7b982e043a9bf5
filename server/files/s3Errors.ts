import { Problem } from '@/shared/contract/problem';

interface StoreError {
  name?: string;
  message?: string;
  code?: string;
  $metadata?: { httpStatusCode?: number };
}

const NETWORK = /\b(ECONN[A-Z]+|ETIMEDOUT|ENOTFOUND|EAI_AGAIN|EPIPE|EHOSTUNREACH|ENETUNREACH)\b/;

export function isMissing(error: unknown): boolean {
  const { name, $metadata } = error as StoreError;
  return (
    name === 'NoSuchKey' ||
    name === 'NotFound' ||
    (name !== 'NoSuchBucket' && $metadata?.httpStatusCode === 404)
  );
}

/**
 * What to throw for a store that does not answer or refuses us: a Problem that a person can read, with the store's
 * own error as its cause for the log. Anything else, such as a full disk on our side, is passed on.
 */
export function storeTrouble(error: unknown): unknown {
  const { name, code, message, $metadata } = error as StoreError;
  const fromStore = $metadata?.httpStatusCode !== undefined || name === 'TimeoutError';
  // The client may wrap a network error into one that keeps only its text.
  const network = NETWORK.test(`${code} ${message}`);
  if (!fromStore && !network) return error;
  const problem = new Problem(
    'unavailable',
    'The object store that keeps the cubes does not do what was asked. Try again in a minute; if it stays so, ' +
      'whoever runs this installation finds the reason in the log.',
  );
  problem.cause = error;
  return problem;
}
