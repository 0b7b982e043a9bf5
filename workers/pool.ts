import Piscina from 'piscina';
import path from 'node:path';

/** Threads run TypeScript through tsx; the entry is found beside this file. */
export const makePool = (maxThreads = 2) =>
  new Piscina({
    filename: path.join(__dirname, 'thread.ts'),
    execArgv: ['--import', 'tsx'],
    minThreads: 0,
    maxThreads,
    idleTimeout: 30_000,
  });
