import { isProblem, Problem, type ProblemBody } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { isChannelContiguous } from '@/shared/fits/planeRange';
import { blockFor } from '@/shared/image/blockAverage';
import { readCubeHead } from '../files/cubeHead';
import { findCube, type CubeRow } from '../store/cubes';
import { appendEvent } from '../store/events';
import { claimCube, failCube, finishCube, releaseCube, renewCube } from '../store/ingests';
import { announce } from './announce';
import { assemble } from './assembleCube';
import type { Parts } from './context';
import { queueMail } from './mail';
import type { Reduced, ReduceTask } from './reduceCube';
import { THUMBNAIL_SIZE } from './thumbnails';

/** Reduces channels in a thread; rejects when the signal fires. */
export type CubeReducer = (task: ReduceTask, onChannel: () => void, signal: AbortSignal) => Promise<Reduced>;

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
  reduce: CubeReducer,
  outer?: AbortSignal,
): Promise<void> {
  if (!(await claimCube(parts.db, cubeId, holder))) return; // ready, cancelled, or another worker has it
  const row = (await findCube(parts.db, cubeId))!;
  const stop = new AbortController();
  const stopNow = () => stop.abort();
  outer?.addEventListener('abort', stopNow);
  const state = { done: 0, activity: 'opening the file' };
  const beat = heartbeat(parts, row, holder, state, stop);
  try {
    await tell(parts, row, 'ingesting', 0, state.activity);
    const head = await readHead(parts, row);
    state.activity = `reading ${head.shape.channels} channels`;
    const reduced = await reduceAll(parts, row, head, reduce, () => state.done++, stop.signal);
    state.activity = 'drawing thumbnails';
    const result = await assemble(head, reduced, stop.signal);
    await parts.db.transaction(async (trx) => {
      if (!(await finishCube(trx, cubeId, holder, result))) return;
      await appendEvent(trx, { teamId: row.teamId, personId: null, kind: 'cube.ready', subjectId: cubeId });
      await announce(trx, row.teamId, {
        subject: 'cube',
        id: cubeId,
        regionId: row.regionId,
        status: 'ready',
        progress: 1,
      });
      await queueMail(trx, parts, { kind: 'cube-ready', cubeId });
    });
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
  }
}

async function readHead(parts: Parts, row: CubeRow): Promise<CubeHead> {
  const source = await parts.cubeFiles.open(row.fileKey);
  return readCubeHead(source).finally(() => source.close());
}

/** Split the channels over the threads, unless every channel is spread over the whole file. */
async function reduceAll(
  parts: Parts,
  row: CubeRow,
  head: CubeHead,
  reduce: CubeReducer,
  onChannel: () => void,
  signal: AbortSignal,
): Promise<Reduced[]> {
  const { nx, ny, channels } = head.shape;
  const shares = isChannelContiguous(head) ? Math.min(parts.config.workerThreads, channels) : 1;
  const cut = (i: number) => Math.round((i * channels) / shares);
  const { dataDir, objectStore } = parts.config;
  return Promise.all(
    Array.from({ length: shares }, (_, i) =>
      reduce(
        {
          files: { dataDir, objectStore },
          fileKey: row.fileKey,
          head: { ...head, cards: [] },
          from: cut(i),
          to: cut(i + 1),
          block: blockFor(nx, ny, THUMBNAIL_SIZE),
        },
        onChannel,
        signal,
      ),
    ),
  );
}

/** Renew the lease and say how far it is, once a second; stop when the lease is no longer ours. */
function heartbeat(
  parts: Parts,
  row: CubeRow,
  holder: string,
  state: { done: number; activity: string },
  stop: AbortController,
): NodeJS.Timeout {
  const channels = Math.max(row.head?.shape.channels ?? 1, 1);
  return setInterval(() => {
    const progress = Math.min((0.95 * state.done) / channels, 0.95);
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
  if (!(await claimCube(parts.db, cubeId, holder))) return;
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
