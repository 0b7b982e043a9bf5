import { randomUUID } from 'node:crypto';
import { Logger, run, type Runner } from 'graphile-worker';
import { Pool } from 'pg';
import { makeMailer } from '@/server/services/mail';
import type { Parts } from '@/server/services/context';
import { sweep } from '@/server/services/sweep';
import { makePool } from './pool';
import { fit } from './tasks/fit';
import { ingest } from './tasks/ingest';
import { mail } from './tasks/mail';
import type { Hands } from './tasks/task';
import { trace } from './tasks/trace';

const SWEEP_MS = 5000;

export interface WorkerProcess {
  stop(): Promise<void>;
}

/** Start taking jobs. Several of these, on several machines, share the work by sharing the database. */
export async function startWorker(parts: Parts): Promise<WorkerProcess> {
  const id = randomUUID();
  const stopping = new AbortController();
  const pool = makePool(parts.config.workerThreads);
  const hands: Hands = {
    pool,
    mailer: makeMailer(parts.config, parts.log),
    holder: (jobId) => `${id}:${jobId}`,
    stopping: stopping.signal,
  };
  const pgPool = new Pool({
    connectionString: parts.config.databaseUrl,
    application_name: `outswell-worker-${id}`,
    max: 4,
  });
  pgPool.on('error', (error) =>
    parts.log.warn({ error: error.message }, 'a connection of the queue was lost'),
  );
  const runner: Runner = await run({
    pgPool,
    concurrency: 2,
    noHandleSignals: true,
    parsedCronItems: [],
    pollInterval: 1000,
    logger: new Logger(() => (level, message, meta) => {
      if (level === 'error' || level === 'warning') parts.log.warn({ ...meta, queue: true }, message);
      else parts.log.debug({ queue: true }, message);
    }),
    taskList: {
      ingest: ingest(parts, hands),
      fit: fit(parts, hands),
      trace: trace(parts, hands),
      mail: mail(parts, hands),
    },
  });
  const look = () =>
    sweep(parts).catch((error) => parts.log.warn({ error: error.message }, 'the sweep failed'));
  void look();
  const timer = setInterval(look, SWEEP_MS);
  parts.log.info({ worker: id }, 'the worker takes jobs');
  return {
    async stop() {
      clearInterval(timer);
      stopping.abort();
      await runner.stop();
      hands.mailer.close();
      await pool.destroy();
      await pgPool.end();
    },
  };
}
