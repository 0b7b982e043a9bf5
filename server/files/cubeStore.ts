import type { Config } from '../config';
import type { ByteSource } from './byteSource';
import { diskCubeStore } from './diskCubeStore';

/** Where the bytes of cubes lie. Keys are like `cubes/<uuid>.fits`; a file, once put, is never changed. */
export interface CubeStore {
  /**
   * Takes over a finished local file: afterwards it is in the store and no longer at `path`.
   * Said again after it was done (the process was killed before it could note so), it does nothing.
   */
  put(key: string, path: string): Promise<void>;
  /** The caller closes the source. Throws a not-found Problem where there is no such file. */
  open(key: string): Promise<ByteSource>;
  /** No error where there is no such file. */
  remove(key: string): Promise<void>;
  exists(key: string): Promise<boolean>;
  writeBytes(key: string, bytes: Uint8Array): Promise<void>;
  /** Gives back connections; for the end of the process. */
  close(): Promise<void>;
}

export function makeCubeStore(config: Pick<Config, 'dataDir' | 'objectStore'>): CubeStore {
  if (!config.objectStore) return diskCubeStore(config.dataDir);
  // Loaded only where it is used: the client for S3 costs a third of a second at every start.
  const { s3CubeStore } = require('./s3CubeStore') as typeof import('./s3CubeStore');
  return s3CubeStore(config.objectStore);
}
