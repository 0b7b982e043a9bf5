import { rows, type Db } from './db';

export type TaskName = 'ingest' | 'fit' | 'trace' | 'mail' | 'sweep';

/**
 * Queue a job in the caller's transaction. The key makes it one job however often it is asked for; a job that a
 * dead worker still holds does not stop a new one of the same key.
 */
export const addJob = (db: Db, task: TaskName, payload: Record<string, unknown>, key: string) =>
  rows(db, 'select graphile_worker.add_job(?, ?::json, job_key => ?, max_attempts => 3)', [
    task,
    JSON.stringify(payload),
    key,
  ]);

export interface QueueCounts {
  waiting: number;
  running: number;
  workers: number;
}

export async function queueCounts(db: Db): Promise<QueueCounts> {
  const [row] = await rows<QueueCounts>(
    db,
    `select count(*) filter (where jobs.locked_at is null and jobs.attempts < jobs.max_attempts)::int as waiting,
            count(*) filter (where jobs.locked_at is not null)::int as running,
            (select count(distinct application_name)::int from pg_stat_activity
             where datname = current_database() and application_name like 'outswell-worker%') as workers
     from graphile_worker.jobs as jobs`,
  );
  return row!;
}

/** A worker claims the record of a job within moments of taking the job; one that has not by then is dead. */
const CLAIM_SECONDS = 10;

/** SQL: no job of this key is going to run. One that a killed worker holds stays locked for hours and does not count. */
export const noJobFor = (key: string): string => `not exists (
  select 1 from graphile_worker.jobs as jobs
  where jobs.key = ${key} and jobs.attempts < jobs.max_attempts
    and (jobs.locked_at is null or jobs.locked_at > now() - interval '${CLAIM_SECONDS} seconds'))`;
