import { GetObjectCommand, type S3Client } from '@aws-sdk/client-s3';
import type { ByteSource } from './byteSource';
import { missingFile } from './missingFile';
import { isMissing, storeTrouble } from './s3Errors';

export interface S3Object {
  Bucket: string;
  Key: string;
  size: number;
}

/** An object as a byte source: one range request a read. */
export function s3Source(client: S3Client, { Bucket, Key, size }: S3Object): ByteSource {
  return {
    size,
    async read(offset, length) {
      const end = Math.min(size, offset + length); // exclusive
      if (end <= offset) return new Uint8Array(0); // a range of no bytes cannot be asked for
      try {
        const answer = await client.send(
          new GetObjectCommand({ Bucket, Key, Range: `bytes=${offset}-${end - 1}` }),
        );
        if (!answer.Body) throw new Error('The store answered without a body.');
        return await answer.Body.transformToByteArray();
      } catch (error) {
        throw isMissing(error) ? missingFile(Key) : storeTrouble(error);
      }
    },
    close: async () => {}, // each read is a request of its own
  };
}
