import { randomBytes } from 'node:crypto';
import { isProblem, Problem, type ProblemBody } from '@/shared/contract/problem';
import { findCube, type CubeCopies, type CubeRow } from '../store/cubes';
import { appendEvent } from '../store/events';
import { claimCube, failCube, finishCube, releaseCube, renewCube } from '../store/ingests';
import { announce } from './announce';
import type { Parts } from './context';
import { queueMail } from './mail';
import type { CubeThreads } from './passes';
import { takeIn } from './takeIn';
import { WorkingFiles } from './workingFiles';

const BEAT_MS = 1000;

/**
 * One attempt at reading a cube. Nothing of it is visible until all of it is there; the lease decides who may write,
 * so that a second worker, or a late first one, changes nothing. A file at fault is said on the cube and ends the
 * job; a passing fault gives the cube back and throws, so that the queue tries again.
 */
export async function ingestCube(
  parts: Parts,
  cubeId: string,
  holder: string,
  threads: CubeThreads,
  outer?: AbortSignal,
): Promise<void> {
  const attempt = newAttempt();
  const before = await claimCube(parts.db, cubeId, holder, attempt);
  if (before === undefined) return; // ready, cancelled, or another worker has it
  const row = (await findCube(parts.db, cubeId))!;
  const files = new WorkingFiles(parts, cubeId, attempt);
  const stop = new AbortController();
  const stopNow = () => stop.abort();
  outer?.addEventListener('abort', stopNow);
  const state = { progress: 0, activity: 'opening the file' };
  const beat = heartbeat(parts, row, holder, state, stop);
  try {
    await tell(parts, row, 'ingesting', 0, state.activity);
    const present = keysOf(row);
    await files.clean();
    if (before !== null) await new WorkingFiles(parts, cubeId, before).discard(present);
    const result = await takeIn(parts, row, files, threads, state, stop.signal);
    const done = await parts.db.transaction(async (trx) => {
      if (!(await finishCube(trx, cubeId, holder, result))) return false;
      await appendEvent(trx, { teamId: row.teamId, personId: null, kind: 'cube.ready', subjectId: cubeId });
      await announce(trx, row.teamId, {
        subject: 'cube',
        id: cubeId,
        regionId: row.regionId,
        status: 'ready',
        progress: 1,
      });
      await queueMail(trx, parts, { kind: 'cube-ready', cubeId });
      return true;
    });
    if (done) for (const key of present) await parts.cubeFiles.remove(key);
  } catch (error) {
    if (isProblem(error)) await fail(parts, row, holder, error.toJSON());
    else {
      // stopped by a person: the row no longer names this lease and nothing happens; stopped with the worker: it waits
      await releaseCube(parts.db, cubeId, holder);
      if (!stop.signal.aborted) throw error;
    }
  } finally {
    clearInterval(beat);
    outer?.removeEventListener('abort', stopNow);
    await discardUnnamed(parts, cubeId, files);
  }
}

/** Remove what the row does not name. A database that is away says nothing, so that then all stays for the next attempt. */
async function discardUnnamed(parts: Parts, cubeId: string, files: WorkingFiles) {
  try {
    await files.discard(keysOf((await findCube(parts.db, cubeId))!));
  } catch (error) {
    parts.log.warn({ error, cubeId }, 'files of an attempt that are no use stay until the next one');
  }
}

const newAttempt = () => randomBytes(5).toString('hex');
const keysOf = ({ planesKey, spectraKey, reducedKey }: CubeCopies) =>
  [planesKey, spectraKey, reducedKey].filter((key) => key !== null);

/** Renew the lease and say how far it is, once a second; stop when the lease is no longer ours. */
function heartbeat(
  parts: Parts,
  row: CubeRow,
  holder: string,
  state: { progress: number; activity: string },
  stop: AbortController,
): NodeJS.Timeout {
  return setInterval(() => {
    const progress = Math.min(state.progress, 0.95);
    renewCube(parts.db, row.id, holder, progress, state.activity)
      .then(async (held) => {
        if (held) await tell(parts, row, 'ingesting', progress, state.activity);
        else stop.abort();
      })
      .catch(() => undefined); // a database that is away for a moment is noticed by the next beat
  }, BEAT_MS);
}

async function fail(parts: Parts, row: CubeRow, holder: string, problem: ProblemBody) {
  await parts.db.transaction(async (trx) => {
    if (!(await failCube(trx, row.id, holder, problem))) return;
    await appendEvent(trx, {
      teamId: row.teamId,
      personId: null,
      kind: 'cube.failed',
      subjectId: row.id,
      data: { ...problem },
    });
    await announce(trx, row.teamId, {
      subject: 'cube',
      id: row.id,
      regionId: row.regionId,
      status: 'failed',
    });
    await queueMail(trx, parts, { kind: 'cube-failed', cubeId: row.id });
  });
}

/** After the last attempt the cause stays on the cube, with a way to try again. */
export async function giveUpIngest(
  parts: Parts,
  cubeId: string,
  holder: string,
  cause: string,
): Promise<void> {
  if ((await claimCube(parts.db, cubeId, holder, newAttempt())) === undefined) return;
  const row = (await findCube(parts.db, cubeId))!;
  await fail(
    parts,
    row,
    holder,
    new Problem('ingest-failed', `Reading failed three times: ${cause}. Try again.`).toJSON(),
  );
}

const tell = (parts: Parts, row: CubeRow, status: string, progress: number, activity: string) =>
  announce(parts.db, row.teamId, {
    subject: 'cube',
    id: row.id,
    regionId: row.regionId,
    status,
    progress,
    activity,
  });
