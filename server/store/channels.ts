import type { Channel, MapKind } from '@/shared/contract/cubes';
import { rows, type Db } from './db';

export const listChannels = (db: Db, cubeId: string) =>
  rows<Channel>(
    db,
    `select channels.channel, channels.velocity, channels.minimum, channels.maximum, channels.mean, channels.median,
            channels.rms,
            channels.rms_about_zero as "rmsAboutZero", channels.blanks
     from channels where channels.cube_id = ? order by channels.channel`,
    [cubeId],
  );

/** The same channels at other velocities, in their order. */
export const updateVelocities = (db: Db, cubeId: string, velocities: readonly number[]) =>
  rows(
    db,
    `update channels set velocity = given.velocity
     from unnest(?::int[], ?::float8[]) as given(channel, velocity)
     where channels.cube_id = ? and channels.channel = given.channel`,
    [velocities.map((_, channel) => channel), [...velocities], cubeId] as never[],
  );

export async function findThumbnail(db: Db, cubeId: string, channel: number): Promise<Buffer | undefined> {
  const found = await rows<{ thumbnail: Buffer }>(
    db,
    'select channels.thumbnail from channels where channels.cube_id = ? and channels.channel = ?',
    [cubeId, channel],
  );
  return found[0]?.thumbnail;
}

export interface CubeImage {
  meta: Record<string, unknown>;
  bytes: Buffer;
}
export async function findImage(
  db: Db,
  cubeId: string,
  kind: MapKind | 'strip',
): Promise<CubeImage | undefined> {
  const found = await rows<CubeImage>(
    db,
    'select cube_images.meta, cube_images.bytes from cube_images where cube_images.cube_id = ? and cube_images.kind = ?',
    [cubeId, kind],
  );
  return found[0];
}
