import { randomUUID } from 'node:crypto';
import { mkdir, open, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { MAX_IMAGE_BYTES, type SkyImage } from '@/shared/contract/images';
import { Problem } from '@/shared/contract/problem';
import { openDiskSource } from '../files/byteSource';
import { checksumOf } from '../files/checksum';
import { freeBytes } from '../files/diskSpace';
import { readImageFile } from '../files/imageFile';
import { isUniqueViolation } from '../store/db';
import { findImageByChecksum, insertImage } from '../store/images';
import type { Context } from './context';
import { bareName, safeName } from './fileNames';
import { readImage, writeImage } from './images';
import { regionFor } from './regions';

/** Room on the disk that an image must leave. */
const SPARE_BYTES = 256 * 2 ** 20;

/** A file on its way in. */
export interface SentImage {
  fileName: string | undefined;
  /** Bytes that the request says it has; NaN when it does not. */
  declaredBytes: number;
  bytes: AsyncIterable<Uint8Array>;
}

/**
 * Take in a companion image: the bytes as they were sent are kept, with a plain copy beside them where they are
 * compressed. Whatever is refused leaves nothing behind.
 */
export async function addImage(ctx: Context, regionId: string, sent: SentImage): Promise<SkyImage> {
  const { teamId } = await regionFor(ctx, regionId, 'cube.upload');
  if (sent.declaredBytes > MAX_IMAGE_BYTES) throw tooLarge();
  const id = randomUUID();
  const folder = join(ctx.config.dataDir, 'working');
  const path = join(folder, `${id}.image`);
  const copyPath = join(folder, `${id}.image-plain`);
  const fileKey = `images/${id}.fits`;
  const plainKey = `images/${id}.plain.fits`;
  const dropStored = () => Promise.all([fileKey, plainKey].map((key) => ctx.cubeFiles.remove(key)));
  await mkdir(folder, { recursive: true });
  await requireRoom(folder, sent.declaredBytes);
  try {
    const sizeBytes = await receive(sent.bytes, path);
    const checksum = await checksumAt(path);
    await refuseDuplicate(ctx, regionId, checksum);
    const { head, isCopied } = await readImageFile(path, copyPath);
    const fileName = safeName(sent.fileName, 'image.fits');
    try {
      await ctx.cubeFiles.put(fileKey, path);
      if (isCopied) await ctx.cubeFiles.put(plainKey, copyPath);
      const image = {
        ...{
          id,
          regionId,
          name: bareName(fileName),
          fileName,
          fileKey,
          plainKey: isCopied ? plainKey : null,
        },
        ...{ sizeBytes, checksum, head, createdBy: ctx.actor.id },
      };
      await writeImage(ctx, { id, teamId, regionId }, 'image.added', (trx) => insertImage(trx, image));
    } catch (error) {
      await dropStored();
      // the same file may be added twice at the same moment
      if (isUniqueViolation(error, 'sky_images_checksum')) await refuseDuplicate(ctx, regionId, checksum);
      throw error;
    }
    return await readImage(ctx, id);
  } finally {
    await Promise.all([path, copyPath].map((file) => rm(file, { force: true })));
  }
}

/** Write what arrives to a file, no more than is allowed. */
async function receive(bytes: AsyncIterable<Uint8Array>, path: string): Promise<number> {
  const out = await open(path, 'w');
  let size = 0;
  try {
    for await (const piece of bytes) {
      size += piece.length;
      if (size > MAX_IMAGE_BYTES) throw tooLarge();
      await out.write(piece);
    }
    return size;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ECONNRESET') throw error;
    throw new Problem('upload-protocol', 'The connection ended before the file did. Send it again.');
  } finally {
    await out.close();
  }
}

async function checksumAt(path: string): Promise<string> {
  const source = await openDiskSource(path);
  return checksumOf(source).finally(() => source.close());
}

async function refuseDuplicate(ctx: Context, regionId: string, checksum: string): Promise<void> {
  const twin = await findImageByChecksum(ctx.db, regionId, checksum);
  if (twin)
    throw new Problem(
      'duplicate-file',
      `The same bytes are in this region already, as ${twin.name}. Use that image.`,
      { imageId: twin.id },
    );
}

async function requireRoom(folder: string, declaredBytes: number): Promise<void> {
  const wanted = Number.isFinite(declaredBytes) ? declaredBytes : MAX_IMAGE_BYTES;
  const free = await freeBytes(folder);
  if (wanted + SPARE_BYTES > free)
    throw new Problem(
      'disk-full',
      `The server has ${Math.floor(Math.max(free - SPARE_BYTES, 0) / 1e6)} MB left. Ask whoever runs it for room.`,
    );
}

const tooLarge = () =>
  new Problem(
    'too-large',
    `A companion image has at most ${MAX_IMAGE_BYTES / 2 ** 20} MiB as a file. Cut it to the sky of the region, average it to larger pixels, or compress it with gzip.`,
  );
