import { stat, unlink } from 'node:fs/promises';
import { DeleteObjectCommand, HeadObjectCommand, PutObjectCommand, S3Client } from '@aws-sdk/client-s3';
import type { ObjectStoreConfig } from '../config';
import { checkKey } from './cubeKey';
import type { CubeStore } from './cubeStore';
import { missingFile } from './missingFile';
import { isMissing, storeTrouble } from './s3Errors';
import { s3Source } from './s3Source';
import { uploadFile, type UploadSizes } from './s3Upload';

const silent = { debug() {}, info() {}, warn() {}, error() {} };

/** Cubes in a bucket of an S3-compatible store. */
export function s3CubeStore(config: ObjectStoreConfig, sizes?: UploadSizes): CubeStore {
  const client = new S3Client({
    endpoint: config.endpoint,
    region: config.region,
    forcePathStyle: config.forcePathStyle,
    credentials: { accessKeyId: config.accessKeyId, secretAccessKey: config.secretAccessKey },
    // Checksums as trailers need a framing that not every store takes off again.
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    logger: silent, // what fails is thrown; the client would print it too, between our log lines
  });
  const at = (key: string) => ({ Bucket: config.bucket, Key: checkKey(key) });

  /** Size and version of the object, or null where there is none. */
  async function head(key: string) {
    try {
      const { ContentLength, ETag } = await client.send(new HeadObjectCommand(at(key)));
      return { size: ContentLength ?? 0, etag: ETag };
    } catch (error) {
      if (isMissing(error)) return null;
      throw storeTrouble(error);
    }
  }

  return {
    async put(key, path) {
      const place = at(key);
      const size = await sizeOf(path);
      if (size === null && (await head(key))) return;
      await uploadFile(client, place, path, size ?? (await stat(path)).size, sizes).catch((error) => {
        throw storeTrouble(error);
      });
      await unlink(path);
    },

    async open(key) {
      const found = await head(key);
      if (!found) throw missingFile(key);
      return s3Source(client, { ...at(key), ...found });
    },

    async remove(key) {
      await client.send(new DeleteObjectCommand(at(key))).catch((error) => {
        if (!isMissing(error)) throw storeTrouble(error);
      });
    },

    exists: async (key) => (await head(key)) !== null,

    async writeBytes(key, bytes) {
      const put = new PutObjectCommand({ ...at(key), Body: bytes, ContentLength: bytes.length });
      await client.send(put).catch((error) => {
        throw storeTrouble(error);
      });
    },

    close: async () => client.destroy(),
  };
}

async function sizeOf(path: string): Promise<number | null> {
  try {
    return (await stat(path)).size;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return null;
    throw error;
  }
}
