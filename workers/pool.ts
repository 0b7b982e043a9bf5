import Piscina from 'piscina';
import path from 'node:path';

/** Threads for arithmetic, so that the process that holds the leases always has time to renew them. */
export const makePool = (maxThreads: number) =>
  new Piscina({
    filename: path.join(__dirname, 'thread.js'),
    minThreads: 0,
    maxThreads,
    idleTimeout: 30_000,
  });
