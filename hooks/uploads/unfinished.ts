import type { UploadState } from '@/shared/contract/cubes';
import type { UploadItem } from './uploadsState';

/** Uploads the server knows and this page does not hold: of others, or of mine from before a reload. */
export const elsewhere = (states: readonly UploadState[], items: readonly UploadItem[]): UploadState[] =>
  states.filter((state) => !items.some((item) => item.uploadId === state.id));

/** Whether a chosen file can be the one that an unfinished upload began with. */
export const sameFile = (file: Pick<File, 'name' | 'size'>, state: UploadState): boolean =>
  file.size === state.sizeBytes && file.name === state.fileName;
