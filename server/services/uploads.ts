import { mkdir, rm, stat } from 'node:fs/promises';
import { join } from 'node:path';
import type { UploadState } from '@/shared/contract/cubes';
import { isProblem, Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { openDiskSource } from '../files/byteSource';
import { checksumOf } from '../files/checksum';
import { readCubeHead } from '../files/cubeHead';
import { freeBytes } from '../files/diskSpace';
import { findCubeByChecksum, insertCube } from '../store/cubes';
import { isoTime, isUniqueViolation } from '../store/db';
import { appendEvent } from '../store/events';
import {
  findUpload,
  insertUpload,
  listUploads,
  openUploads,
  updateUpload,
  type UploadRow,
} from '../store/uploads';
import { notFound } from './access';
import { announce } from './announce';
import type { Context, Parts } from './context';
import { queueIngest } from './cubes';
import { bareName, safeName } from './fileNames';
import { regionFor } from './regions';

/** Room that an upload must leave for the database and for what ingest writes. */
const SPARE_BYTES = 256 * 2 ** 20;

export const uploadDirectory = (parts: Pick<Parts, 'config'>) => join(parts.config.dataDir, 'uploads');
export const uploadPath = (parts: Pick<Parts, 'config'>, id: string) => join(uploadDirectory(parts), id);

export async function uploadsOfRegion(ctx: Context, regionId: string): Promise<UploadState[]> {
  await regionFor(ctx, regionId, 'region.read');
  return (await listUploads(ctx.db, regionId)).map((row) => ({
    id: row.id,
    regionId: row.regionId,
    fileName: row.fileName,
    sizeBytes: row.sizeBytes,
    receivedBytes: row.receivedBytes,
    status: row.status as UploadState['status'],
    problem: row.problem,
    createdAt: isoTime(row.createdAt),
    mine: row.personId === ctx.actor.id,
  }));
}

export async function beginUpload(
  ctx: Context,
  draft: {
    id: string;
    regionId: string | null | undefined;
    fileName: string | null | undefined;
    size: number | undefined;
  },
): Promise<void> {
  if (!draft.regionId || !/^[0-9a-f-]{36}$/i.test(draft.regionId))
    throw new Problem('invalid-input', 'The upload names no region.', { field: 'regionId' });
  const { teamId } = await regionFor(ctx, draft.regionId, 'cube.upload');
  if (draft.size === undefined)
    throw new Problem('upload-protocol', 'Say the length of the file when the upload begins.', {
      field: 'Upload-Length',
    });
  if (draft.size === 0) throw new Problem('not-fits', 'This file is empty.');
  await mkdir(uploadDirectory(ctx), { recursive: true });
  const free = await freeBytes(uploadDirectory(ctx));
  if (draft.size + SPARE_BYTES > free)
    throw new Problem(
      'disk-full',
      `The file has ${megabytes(draft.size)}, and the server has ${megabytes(Math.max(free - SPARE_BYTES, 0))} left. Ask whoever runs it for room.`,
    );
  await ctx.db.transaction(async (trx) => {
    await insertUpload(trx, {
      id: draft.id,
      regionId: draft.regionId!,
      personId: ctx.actor.id,
      fileName: safeName(draft.fileName, 'cube.fits'),
      sizeBytes: draft.size!,
    });
    await announce(trx, teamId, { subject: 'upload', id: draft.id, regionId: draft.regionId! });
  });
}

const megabytes = (bytes: number) => `${(bytes / 1e6).toFixed(bytes < 1e7 ? 1 : 0)} MB`;

/** The person's own upload. A refused one answers with why it was refused. */
export async function myUpload(ctx: Context, id: string): Promise<UploadRow> {
  const row = await findUpload(ctx.db, id);
  if (!row || row.personId !== ctx.actor.id || row.status === 'cancelled' || row.status === 'done')
    throw notFound('upload');
  await regionFor(ctx, row.regionId, 'cube.upload');
  if (row.problem)
    throw new Problem(row.problem.type.split('/').pop() as Problem['type'], row.problem.detail, row.problem);
  return row;
}

export async function noteReceived(
  parts: Parts,
  row: UploadRow,
  receivedBytes: number,
  headChecked: boolean,
) {
  await updateUpload(parts.db, row.id, { receivedBytes, headChecked });
  await tell(parts, row);
}

/** Keep why the file was refused, drop its bytes, and free the name for another try. */
export async function refuseUpload(parts: Parts, row: UploadRow, problem: Problem): Promise<void> {
  await updateUpload(parts.db, row.id, { status: 'refused', problem: problem.toJSON() });
  await dropBytes(parts, row.id);
  await tell(parts, row);
}

/** Forget an upload of one's own that is not finished. */
export async function cancelUpload(ctx: Context, id: string): Promise<void> {
  const row = await findUpload(ctx.db, id);
  if (!row || row.personId !== ctx.actor.id || row.status === 'done') return;
  await updateUpload(ctx.db, id, { status: 'cancelled' });
  await dropBytes(ctx, id);
  await tell(ctx, row);
}

/**
 * The last byte is there: read the header once more from the whole file, take its checksum, move it to where cubes
 * lie, and queue its ingest. Returns the id of the cube, which is the upload's own: called again after a crash in the
 * middle, it goes on where it was.
 */
export async function finishUpload(parts: Parts, uploadId: string): Promise<string> {
  const row = await findUpload(parts.db, uploadId);
  if (!row) throw notFound('upload');
  if (row.cubeId) return row.cubeId;
  const path = uploadPath(parts, uploadId);
  const fileKey = fileKeyOf(uploadId);
  await updateUpload(parts.db, uploadId, { status: 'checking', receivedBytes: row.sizeBytes });
  await tell(parts, row);
  try {
    const source =
      (await sizeOf(path)) === null ? await parts.cubeFiles.open(fileKey) : await openDiskSource(path);
    const checked = async () => ({
      head: await readCubeHead(source, { maxExpandedBytes: parts.config.maxExpandedBytes }),
      checksum: await checksumOf(source),
    });
    const { head, checksum } = await checked().finally(() => source.close());
    await refuseDuplicate(parts, row, checksum);
    await parts.cubeFiles.put(fileKey, path);
    await recordCube(parts, row, { fileKey, checksum, head });
    await dropBytes(parts, uploadId);
    return uploadId;
  } catch (error) {
    if (isProblem(error)) {
      await parts.cubeFiles.remove(fileKey);
      await refuseUpload(parts, row, error);
    }
    throw error;
  }
}

const fileKeyOf = (uploadId: string) => `cubes/${uploadId}.fits`;
const sizeOf = async (path: string) => (await stat(path).catch(() => null))?.size ?? null;

async function refuseDuplicate(parts: Parts, row: UploadRow, checksum: string) {
  const twin = await findCubeByChecksum(parts.db, row.regionId, checksum);
  if (twin)
    throw new Problem(
      'duplicate-file',
      `The same bytes are in this region already, as ${twin.name}. Use that cube.`,
      {
        cubeId: twin.id,
      },
    );
}

async function recordCube(
  parts: Parts,
  row: UploadRow,
  cube: { fileKey: string; checksum: string; head: CubeHead },
) {
  const { id } = row;
  try {
    await parts.db.transaction(async (trx) => {
      await insertCube(trx, {
        id,
        regionId: row.regionId,
        name: bareName(row.fileName),
        fileName: row.fileName,
        fileKey: cube.fileKey,
        sizeBytes: row.sizeBytes,
        checksum: cube.checksum,
        head: cube.head,
        createdBy: row.personId,
      });
      await updateUpload(trx, row.id, { status: 'done', cubeId: id });
      await queueIngest(trx, id);
      const { teamId } = row;
      await appendEvent(trx, { teamId, personId: row.personId, kind: 'cube.uploaded', subjectId: id });
      await announce(trx, teamId, { subject: 'cube', id, regionId: row.regionId, status: 'uploaded' });
    });
  } catch (error) {
    // two uploads of the same file may finish at the same moment
    if (isUniqueViolation(error, 'cubes_checksum')) await refuseDuplicate(parts, row, cube.checksum);
    throw error;
  }
}

/** Uploads whose last byte came just before the server stopped. */
export async function finishInterrupted(parts: Parts): Promise<void> {
  for (const { id, sizeBytes } of await openUploads(parts.db)) {
    const size = await sizeOf(uploadPath(parts, id));
    const complete = size === null ? await parts.cubeFiles.exists(fileKeyOf(id)) : size === sizeBytes;
    if (!complete) continue;
    await finishUpload(parts, id).catch((error) =>
      parts.log.warn({ error, upload: id }, 'an interrupted upload was refused'),
    );
  }
}

export const uploadById = (parts: Pick<Parts, 'db'>, id: string) => findUpload(parts.db, id);

const dropBytes = async (parts: Parts, id: string) => {
  const path = uploadPath(parts, id);
  await Promise.all([rm(path, { force: true }), rm(`${path}.json`, { force: true })]);
};

const tell = (parts: Parts, row: UploadRow) =>
  announce(parts.db, row.teamId, { subject: 'upload', id: row.id, regionId: row.regionId });
