import type { FitOptions, FitOutcome, FrozenMark, ModelName } from '@/shared/contract/fits';
import type { ProblemBody } from '@/shared/contract/problem';
import { rows, type Db } from './db';
import { noJobFor } from './queue';

export interface FrozenReading {
  channelWidth: number;
  marks: FrozenMark[];
  /** Of a traced rim: what widens its error bars. */
  traced?: { beamDeg: number; faint: boolean };
}
export interface FitRow {
  id: string;
  teamId: string;
  regionId: string;
  shellId: string;
  readingId: string;
  readingRevision: number;
  cubeId: string;
  model: ModelName;
  options: FitOptions;
  status: 'queued' | 'running' | 'done' | 'failed' | 'cancelled';
  progress: number | null;
  activity: string | null;
  outcome: FitOutcome | null;
  problem: ProblemBody | null;
  traceId: string | null;
  adopted: boolean;
  createdById: string | null;
  createdByName: string | null;
  createdAt: Date;
  finishedAt: Date | null;
}

const select = `
  select fits.id, regions.team_id as "teamId", regions.id as "regionId", fits.shell_id as "shellId",
         fits.reading_id as "readingId",
         fits.reading_revision as "readingRevision", fits.cube_id as "cubeId", fits.model, fits.options, fits.status,
         fits.progress, fits.activity, fits.outcome, fits.problem, fits.trace_id as "traceId", coalesce(shells.adopted_fit_id = fits.id, false) as adopted,
         fits.created_by as "createdById", people.name as "createdByName", fits.created_at as "createdAt",
         fits.finished_at as "finishedAt"
  from fits
  join shells on shells.id = fits.shell_id
  join regions on regions.id = shells.region_id
  left join people on people.id = fits.created_by`;

export async function findFit(db: Db, id: string): Promise<FitRow | undefined> {
  return (await rows<FitRow>(db, `${select} where fits.id = ?`, [id]))[0];
}

export const listFits = (db: Db, shellId: string) =>
  rows<FitRow>(db, `${select} where fits.shell_id = ? order by fits.created_at desc, fits.id`, [shellId]);

export async function findFrozenReading(db: Db, fitId: string): Promise<FrozenReading | undefined> {
  return (
    await rows<{ marks: FrozenReading }>(db, 'select fits.marks from fits where fits.id = ?', [fitId])
  )[0]?.marks;
}

/** The draws of the bootstrap: float64, little-endian, one row of the parameters each. */
export async function findDraws(db: Db, fitId: string): Promise<Buffer | null> {
  return (
    await rows<{ draws: Buffer | null }>(db, 'select fits.draws from fits where fits.id = ?', [fitId])
  )[0]!.draws;
}

export const insertFit = (
  db: Db,
  fit: {
    id: string;
    shellId: string;
    readingId: string;
    cubeId: string;
    model: ModelName;
    options: FitOptions;
    marks: FrozenReading;
    readingRevision: number;
    traceId: string | null;
    createdBy: string;
  },
) =>
  db('fits').insert({
    id: fit.id,
    shell_id: fit.shellId,
    reading_id: fit.readingId,
    cube_id: fit.cubeId,
    model: fit.model,
    options: JSON.stringify(fit.options),
    marks: JSON.stringify(fit.marks),
    reading_revision: fit.readingRevision,
    trace_id: fit.traceId,
    created_by: fit.createdBy,
  });

const LEASE_SECONDS = 30;

export async function claimFit(db: Db, id: string, holder: string): Promise<boolean> {
  const found = await rows(
    db,
    `update fits set status = 'running', progress = 0, lease_holder = ?,
            lease_until = now() + make_interval(secs => ?)
     where id = ? and (status = 'queued' or (status = 'running' and lease_until < now())) returning id`,
    [holder, LEASE_SECONDS, id],
  );
  return found.length > 0;
}

/** Renew the lease and say how far it is. False: cancelled or taken over; stop. */
export async function renewFit(
  db: Db,
  id: string,
  holder: string,
  { progress, activity }: { progress: number; activity: string },
): Promise<boolean> {
  const found = await rows(
    db,
    `update fits set lease_until = now() + make_interval(secs => ?), progress = ?, activity = ?
     where id = ? and lease_holder = ? and status = 'running' returning id`,
    [LEASE_SECONDS, progress, activity, id, holder],
  );
  return found.length > 0;
}

/** Result and status are written once, naming the lease. False: the lease is lost. */
export async function finishFit(
  db: Db,
  id: string,
  holder: string,
  result: { outcome: FitOutcome; draws: Buffer | null } | { problem: ProblemBody },
): Promise<boolean> {
  const done = 'outcome' in result;
  const found = await rows(
    db,
    `update fits set status = ?, outcome = ?::jsonb, draws = ?, problem = ?::jsonb, progress = null, activity = null,
            finished_at = now(), lease_holder = null, lease_until = null
     where id = ? and lease_holder = ? and status = 'running' returning id`,
    [
      done ? 'done' : 'failed',
      done ? JSON.stringify(result.outcome) : null,
      done ? result.draws : null,
      done ? null : JSON.stringify(result.problem),
      id,
      holder,
    ] as never[],
  );
  return found.length > 0;
}

export async function moveFit(
  db: Db,
  id: string,
  before: FitRow['status'][],
  after: 'queued' | 'cancelled',
): Promise<boolean> {
  const found = await rows(
    db,
    `update fits set status = ?, problem = null, progress = null, activity = null, lease_holder = null,
            lease_until = null, finished_at = case when ? = 'cancelled' then now() end
     where id = ? and status = any(?) returning id`,
    [after, after, id, before],
  );
  return found.length > 0;
}

export const releaseFit = (db: Db, id: string, holder: string) =>
  rows(
    db,
    `update fits set status = 'queued', progress = null, activity = null, lease_holder = null, lease_until = null
     where id = ? and lease_holder = ? and status = 'running'`,
    [id, holder],
  );

export const abandonedFits = (db: Db) =>
  rows<{ id: string }>(
    db,
    `select fits.id from fits
     where (fits.status = 'running' and fits.lease_until < now())
        or (fits.status = 'queued' and ${noJobFor("'fit:' || fits.id::text")})`,
  );
