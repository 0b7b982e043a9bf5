import { mkdirSync } from 'node:fs';
import { Readable } from 'node:stream';
import { FileStore } from '@tus/file-store';
import { HeadGate } from '../files/headGate';
import type { Parts } from './context';
import * as uploads from './uploads';

/** Keeps incoming bytes on disk, and looks at the header of each cube as it passes. */
export class CheckedStore extends FileStore {
  constructor(private readonly parts: Parts) {
    mkdirSync(uploads.uploadDirectory(parts), { recursive: true });
    super({ directory: uploads.uploadDirectory(parts) });
  }

  override async write(incoming: Readable, id: string, offset: number): Promise<number> {
    const row = (await uploads.uploadById(this.parts, id))!;
    const gate = new HeadGate(row.sizeBytes, this.parts.config.maxExpandedBytes);
    if (row.headChecked) gate.accepted = true;
    else if (offset > 0) await gate.resume(uploads.uploadPath(this.parts, id), offset);
    const received = await super.write(Readable.from(gate.pass(incoming), { objectMode: false }), id, offset);
    if (gate.problem) {
      await uploads.refuseUpload(this.parts, row, gate.problem);
      throw gate.problem;
    }
    await uploads.noteReceived(this.parts, row, received, gate.accepted);
    return received;
  }
}
