import { createReadStream } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import {
  AbortMultipartUploadCommand,
  CompleteMultipartUploadCommand,
  CreateMultipartUploadCommand,
  PutObjectCommand,
  UploadPartCommand,
  type CompletedPart,
  type S3Client,
} from '@aws-sdk/client-s3';

export interface UploadSizes {
  /** Files from this size on go in parts. One request takes 5 GiB at most, and is lost whole when it breaks. */
  partsFromBytes: number;
  /** A store takes 10,000 parts at most: 640 GiB at 64 MiB. */
  partBytes: number;
}

const usual: UploadSizes = { partsFromBytes: 100 * 1024 ** 2, partBytes: 64 * 1024 ** 2 };

/** Sends a local file of known size; with parts, the object appears only when all are there. */
export async function uploadFile(
  client: S3Client,
  place: { Bucket: string; Key: string },
  path: string,
  size: number,
  sizes: UploadSizes = usual,
): Promise<void> {
  if (size < sizes.partsFromBytes) {
    await persistently(() => {
      const Body = createReadStream(path);
      return client.send(new PutObjectCommand({ ...place, Body, ContentLength: size }));
    });
    return;
  }
  const { UploadId } = await client.send(new CreateMultipartUploadCommand(place));
  try {
    const Parts: CompletedPart[] = [];
    for (let start = 0; start < size; start += sizes.partBytes)
      Parts.push(await sendPart(Parts.length + 1, start, Math.min(size, start + sizes.partBytes)));
    await client.send(new CompleteMultipartUploadCommand({ ...place, UploadId, MultipartUpload: { Parts } }));
  } catch (error) {
    // Parts that stay are paid for and seen by nobody. If the store cannot even do this, the first error counts.
    await client.send(new AbortMultipartUploadCommand({ ...place, UploadId })).catch(() => {});
    throw error;
  }

  async function sendPart(PartNumber: number, start: number, end: number): Promise<CompletedPart> {
    const { ETag } = await persistently(() => {
      const Body = createReadStream(path, { start, end: end - 1 });
      return client.send(
        new UploadPartCommand({ ...place, UploadId, PartNumber, Body, ContentLength: end - start }),
      );
    });
    return { PartNumber, ETag };
  }
}

/** The client repeats what fails, but not a stream, which it cannot rewind: so that is begun anew here. */
async function persistently<T>(send: () => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await send();
    } catch (error) {
      if (attempt === 3) throw error;
      await sleep(200 * attempt);
    }
  }
}
