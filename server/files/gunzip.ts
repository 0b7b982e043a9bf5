import { pipeline, Readable } from 'node:stream';
import { createGunzip, constants } from 'node:zlib';
import { isProblem, Problem } from '@/shared/contract/problem';
import type { ReadBytes } from '@/shared/fits/findCube';
import type { ByteSource } from './byteSource';

const READ_BYTES = 256 * 1024;
/** Deflate cannot do better than this, so that a compressed file bounds what it can hold. */
const BEST_RATIO = 1032;

export const isGzip = (bytes: Uint8Array) => bytes[0] === 0x1f && bytes[1] === 0x8b;

/** The most bytes that so many bytes of gzip can expand to. */
export const mostExpanded = (gzipBytes: number) => BEST_RATIO * gzipBytes;

/**
 * The expanded bytes of a gzip file, of all its members, read from front to back; only what was asked for last is
 * kept in memory. Close it to stop the expansion.
 */
export class ExpandedBytes {
  private readonly chunks: AsyncIterator<Buffer>;
  /** Expanded bytes at hand, and where the first of them lies. */
  private held: Buffer = Buffer.alloc(0);
  private start = 0;
  private ended = false;

  /**
   * @param maxBytes expansion beyond it is refused
   * @param partial  the source is the beginning of a file: it may stop anywhere
   */
  constructor(
    source: Pick<ByteSource, 'size' | 'read'>,
    private readonly maxBytes: number,
    private readonly partial = false,
  ) {
    const gunzip = createGunzip({
      chunkSize: READ_BYTES,
      ...(partial && { finishFlush: constants.Z_SYNC_FLUSH }),
    });
    pipeline(Readable.from(pieces(source)), gunzip, () => undefined); // errors come out of the iterator
    this.chunks = gunzip[Symbol.asyncIterator]() as AsyncIterator<Buffer>;
  }

  /** Size of all the bytes: Infinity until the end was met, and of a partial file always. */
  readonly size = (): number => (this.ended && !this.partial ? this.start + this.held.length : Infinity);

  /** The first byte that can still be read. */
  readonly position = (): number => this.start;

  /** Bytes from an offset on, fewer only at the end. Offsets must not fall. */
  readonly read: ReadBytes = async (offset, length) => {
    if (offset < this.start)
      throw new RangeError(`Byte ${offset} of a stream is gone; it is at ${this.start}.`);
    await this.skipTo(offset);
    while (!this.ended && this.start + this.held.length < offset + length) await this.more();
    const from = offset - this.start;
    return from >= this.held.length ? new Uint8Array(0) : this.held.subarray(from, from + length);
  };

  async close(): Promise<void> {
    await this.chunks.return?.();
  }

  private async skipTo(offset: number): Promise<void> {
    for (;;) {
      const gone = Math.min(offset - this.start, this.held.length);
      this.held = this.held.subarray(gone);
      this.start += gone;
      if (this.start === offset || this.ended) return;
      await this.more();
    }
  }

  private async more(): Promise<void> {
    const next = await this.chunks.next().catch((error: unknown) => {
      throw damaged(error);
    });
    if (next.done) {
      this.ended = true;
      return;
    }
    this.held = this.held.length === 0 ? next.value : Buffer.concat([this.held, next.value]);
    const bytes = this.start + this.held.length;
    if (bytes > this.maxBytes)
      throw new Problem(
        'too-large',
        `The gzip file expands to more than ${this.maxBytes} bytes, the most this installation expands.`,
      );
  }
}

async function* pieces(source: Pick<ByteSource, 'size' | 'read'>): AsyncGenerator<Uint8Array> {
  for (let offset = 0; offset < source.size; offset += READ_BYTES) yield source.read(offset, READ_BYTES);
}

function damaged(error: unknown): unknown {
  const code = (error as NodeJS.ErrnoException | null)?.code;
  if (isProblem(error) || !code?.startsWith('Z_')) return error;
  const what =
    code === 'Z_BUF_ERROR'
      ? 'The gzip file ends early'
      : /check/.test((error as Error).message)
        ? 'The checksum of the gzip file does not match its contents'
        : `The gzip file cannot be expanded (${(error as Error).message})`;
  return new Problem('compressed-damaged', `${what}: send the whole, undamaged file.`);
}
