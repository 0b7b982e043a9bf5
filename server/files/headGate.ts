import { open } from 'node:fs/promises';
import { isProblem, type Problem } from '@/shared/contract/problem';
import { checkBeginning } from '@/shared/fits/findCube';
import { checkGzipBeginning } from './gzipBeginning';
import { isGzip } from './gunzip';

/** How much of a refused file is still taken in, so that the answer reaches a client in the middle of sending. */
const DRAIN_BYTES = 32 * 2 ** 20;
/** A header that is not over by then is judged when the file is complete. */
const MOST_HEAD_BYTES = 8 * 2 ** 20;

/**
 * Judges the header of a cube while its first bytes pass by, so that a file that cannot work is refused before the
 * rest of it is sent.
 */
export class HeadGate {
  /** Why the file was refused; set while `pass` runs. */
  problem: Problem | null = null;
  /** The header was read and can be used. */
  accepted = false;
  private seen: Buffer[] = [];
  private length = 0;
  private nextTry = 1;

  /** @param maxExpandedBytes a gzip file that holds a larger cube is refused */
  constructor(
    private readonly fileSize: number,
    private readonly maxExpandedBytes: number,
  ) {}

  /** Begin with what an earlier connection left on disk. */
  async resume(path: string, offset: number): Promise<void> {
    const file = await open(path, 'r');
    try {
      const { buffer, bytesRead } = await file.read(Buffer.alloc(Math.min(offset, MOST_HEAD_BYTES)), 0);
      this.take(buffer.subarray(0, bytesRead));
    } finally {
      await file.close();
    }
  }

  /** The same bytes, until they are refused; then nothing more. */
  async *pass(chunks: AsyncIterable<Buffer>): AsyncGenerator<Buffer> {
    let drained = 0;
    for await (const chunk of chunks) {
      if (!this.accepted && !this.problem && this.length < MOST_HEAD_BYTES) {
        this.take(chunk);
        await this.look();
      }
      if (!this.problem) yield chunk;
      else if ((drained += chunk.length) > DRAIN_BYTES) return;
    }
  }

  private take(chunk: Buffer) {
    this.seen.push(chunk);
    this.length += chunk.length;
  }

  private async look(): Promise<void> {
    // a long header is looked at each time it has doubled, not for every packet
    if (this.length < this.nextTry && this.length < this.fileSize) return;
    if (this.length < 2 && this.length < this.fileSize) return; // gzip shows in two bytes
    this.nextTry = this.length * 2;
    try {
      const bytes = Buffer.concat(this.seen);
      const head = isGzip(bytes)
        ? await checkGzipBeginning(bytes, this.fileSize, this.maxExpandedBytes)
        : await checkBeginning(bytes, this.fileSize);
      if (!head) return;
      this.accepted = true;
      this.seen = [];
    } catch (error) {
      if (!isProblem(error)) throw error;
      this.problem = error;
    }
  }
}
