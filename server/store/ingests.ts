/** What one worker does to one cube. Every write names the lease, so that a late twin changes nothing. */
import type { MapKind } from '@/shared/contract/cubes';
import type { ProblemBody } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import type { CubeCopies, CubeStatistics } from './cubes';
import { rows, type Db } from './db';
import { noJobFor } from './queue';

export const LEASE_SECONDS = 10;

/**
 * Take the cube if it waits, or if the worker that had it stopped renewing its lease.
 *
 * @param attempt a name for this attempt, which its files carry
 * @returns the name of the attempt before, null when there was none; undefined when the cube is not to be had
 */
export async function claimCube(
  db: Db,
  id: string,
  holder: string,
  attempt: string,
): Promise<string | null | undefined> {
  const found = await rows<{ before: string | null }>(
    db,
    `update cubes set attempt = ?, status = 'ingesting', lease_holder = ?, lease_until = now() + make_interval(secs => ?),
            progress = 0, problem = null, activity = 'opening the file'
     from (select id as found, attempt as before from cubes where id = ? for update) as old
     where id = old.found and removed_at is null
       and (status = 'uploaded' or (status = 'ingesting' and lease_until < now()))
     returning old.before`,
    [attempt, holder, LEASE_SECONDS, id],
  );
  return found[0]?.before;
}

/** Renew the lease and say how far it is. False: cancelled, removed or taken over; stop. */
export async function renewCube(
  db: Db,
  id: string,
  holder: string,
  progress: number,
  activity: string,
): Promise<boolean> {
  const found = await rows(
    db,
    `update cubes set lease_until = now() + make_interval(secs => ?), progress = ?, activity = ?
     where id = ? and lease_holder = ? and status = 'ingesting' and removed_at is null returning id`,
    [LEASE_SECONDS, progress, activity, id, holder],
  );
  return found.length > 0;
}

export interface ChannelDraft {
  channel: number;
  velocity: number;
  minimum: number | null;
  maximum: number | null;
  mean: number | null;
  median: number | null;
  rms: number | null;
  rmsAboutZero: number | null;
  blanks: number;
  thumbnail: Buffer;
}
export interface ImageDraft {
  kind: MapKind | 'strip';
  meta: Record<string, unknown>;
  bytes: Buffer;
}

/** Replace whatever an earlier attempt left, and finish, in the caller's transaction. False: the lease is lost. */
export async function finishCube(
  db: Db,
  id: string,
  holder: string,
  result: {
    head: CubeHead;
    statistics: CubeStatistics;
    window: [number, number];
    channels: ChannelDraft[];
    images: ImageDraft[];
    copies: CubeCopies;
  },
): Promise<boolean> {
  const found = await rows(
    db,
    `update cubes set status = 'ready', progress = 1, activity = null, ready_at = now(), lease_holder = null,
            lease_until = null, head = ?::jsonb, statistics = ?::jsonb, window_low = ?, window_high = ?,
            planes_key = ?, spectra_key = ?, reduced_key = ?, layout = ?::jsonb
     where id = ? and lease_holder = ? and status = 'ingesting' returning id`,
    [
      JSON.stringify(result.head),
      JSON.stringify(result.statistics),
      result.window[0],
      result.window[1],
      result.copies.planesKey,
      result.copies.spectraKey,
      result.copies.reducedKey,
      JSON.stringify(result.copies.layout),
      id,
      holder,
    ],
  );
  if (found.length === 0) return false;
  await db('channels').where({ cube_id: id }).delete();
  await db('cube_images').where({ cube_id: id }).delete();
  for (let first = 0; first < result.channels.length; first += 256) {
    await db('channels').insert(
      result.channels.slice(first, first + 256).map((c) => ({
        cube_id: id,
        channel: c.channel,
        velocity: c.velocity,
        minimum: c.minimum,
        maximum: c.maximum,
        mean: c.mean,
        median: c.median,
        rms: c.rms,
        rms_about_zero: c.rmsAboutZero,
        blanks: c.blanks,
        thumbnail: c.thumbnail,
      })),
    );
  }
  for (const image of result.images)
    await db('cube_images').insert({
      cube_id: id,
      kind: image.kind,
      meta: JSON.stringify(image.meta),
      bytes: image.bytes,
    });
  return true;
}

/** The input is at fault: say so on the cube. False: the lease is lost. */
export async function failCube(db: Db, id: string, holder: string, problem: ProblemBody): Promise<boolean> {
  const found = await rows(
    db,
    `update cubes set status = 'failed', activity = null, problem = ?::jsonb, lease_holder = null, lease_until = null
     where id = ? and lease_holder = ? and status = 'ingesting' returning id`,
    [JSON.stringify(problem), id, holder],
  );
  return found.length > 0;
}

/** Give the cube back to the queue, for a fault that may pass. */
export const releaseCube = (db: Db, id: string, holder: string) =>
  rows(
    db,
    `update cubes set status = 'uploaded', activity = 'waiting for a worker', lease_holder = null, lease_until = null
     where id = ? and lease_holder = ? and status = 'ingesting'`,
    [id, holder],
  );

/** Cubes that wait without a job, or whose worker died. */
export const abandonedCubes = (db: Db) =>
  rows<{ id: string }>(
    db,
    `select cubes.id from cubes
     where cubes.removed_at is null and (
       (cubes.status = 'ingesting' and cubes.lease_until < now())
       or (cubes.status = 'uploaded' and ${noJobFor("'ingest:' || cubes.id::text")}))`,
  );
