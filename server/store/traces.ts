import type { ProblemBody } from '@/shared/contract/problem';
import type { Edge, Trace, TraceOutcome } from '@/shared/contract/traces';
import { rows, type Db } from './db';
import { noJobFor } from './queue';

export interface TraceRow {
  id: string;
  teamId: string;
  regionId: string;
  shellId: string;
  fitId: string;
  cubeId: string;
  edge: Edge;
  status: Trace['status'];
  progress: number | null;
  outcome: TraceOutcome | null;
  problem: ProblemBody | null;
  readingId: string | null;
  createdById: string;
  createdByName: string;
  createdAt: Date;
  finishedAt: Date | null;
}

const select = `
  select traces.id, regions.team_id as "teamId", regions.id as "regionId", traces.shell_id as "shellId",
         traces.fit_id as "fitId", traces.cube_id as "cubeId", traces.edge, traces.status, traces.progress,
         traces.outcome, traces.problem, traces.reading_id as "readingId", traces.created_by as "createdById",
         people.name as "createdByName", traces.created_at as "createdAt", traces.finished_at as "finishedAt"
  from traces
  join shells on shells.id = traces.shell_id
  join regions on regions.id = shells.region_id
  join people on people.id = traces.created_by`;

export async function findTrace(db: Db, id: string): Promise<TraceRow | undefined> {
  return (await rows<TraceRow>(db, `${select} where traces.id = ?`, [id]))[0];
}

export const listTraces = (db: Db, shellId: string) =>
  rows<TraceRow>(db, `${select} where traces.shell_id = ? order by traces.created_at desc, traces.id`, [
    shellId,
  ]);

export const insertTrace = (
  db: Db,
  trace: { id: string; shellId: string; fitId: string; cubeId: string; edge: Edge; createdBy: string },
) =>
  db('traces').insert({
    id: trace.id,
    shell_id: trace.shellId,
    fit_id: trace.fitId,
    cube_id: trace.cubeId,
    edge: trace.edge,
    created_by: trace.createdBy,
  });

const LEASE_SECONDS = 30;

export async function claimTrace(db: Db, id: string, holder: string): Promise<boolean> {
  const found = await rows(
    db,
    `update traces set status = 'running', progress = 0, lease_holder = ?,
            lease_until = now() + make_interval(secs => ?)
     where id = ? and (status = 'queued' or (status = 'running' and lease_until < now())) returning id`,
    [holder, LEASE_SECONDS, id],
  );
  return found.length > 0;
}

/** False: cancelled or taken over; stop. */
export async function renewTrace(db: Db, id: string, holder: string, progress: number): Promise<boolean> {
  const found = await rows(
    db,
    `update traces set lease_until = now() + make_interval(secs => ?), progress = ?
     where id = ? and lease_holder = ? and status = 'running' returning id`,
    [LEASE_SECONDS, progress, id, holder],
  );
  return found.length > 0;
}

/** Result and status are written once, naming the lease. False: the lease is lost. */
export async function finishTrace(
  db: Db,
  id: string,
  holder: string,
  result: { outcome: TraceOutcome; readingId: string | null } | { problem: ProblemBody },
): Promise<boolean> {
  const done = 'outcome' in result;
  const found = await rows(
    db,
    `update traces set status = ?, outcome = ?::jsonb, reading_id = ?, problem = ?::jsonb, progress = null,
            finished_at = now(), lease_holder = null, lease_until = null
     where id = ? and lease_holder = ? and status = 'running' returning id`,
    [
      done ? 'done' : 'failed',
      done ? JSON.stringify(result.outcome) : null,
      done ? result.readingId : null,
      done ? null : JSON.stringify(result.problem),
      id,
      holder,
    ] as never[],
  );
  return found.length > 0;
}

/** False: it was at its end by then. */
export async function cancelTraceRow(db: Db, id: string): Promise<boolean> {
  const found = await rows(
    db,
    `update traces set status = 'cancelled', progress = null, lease_holder = null, lease_until = null,
            finished_at = now()
     where id = ? and status in ('queued', 'running') returning id`,
    [id],
  );
  return found.length > 0;
}

export const releaseTrace = (db: Db, id: string, holder: string) =>
  rows(
    db,
    `update traces set status = 'queued', progress = null, lease_holder = null, lease_until = null
     where id = ? and lease_holder = ? and status = 'running'`,
    [id, holder],
  );

export const abandonedTraces = (db: Db) =>
  rows<{ id: string }>(
    db,
    `select traces.id from traces
     where (traces.status = 'running' and traces.lease_until < now())
        or (traces.status = 'queued' and ${noJobFor("'trace:' || traces.id::text")})`,
  );
