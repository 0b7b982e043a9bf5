import type { Upload } from 'tus-js-client';
import type { ProblemBody } from '@/shared/contract/problem';
import { API, csrfHeaders, problemFrom } from '../api';

export interface SenderEvents {
  onNamed: (uploadId: string) => void;
  onProgress: (sent: number) => void;
  /** The line broke or the server is not well: worth another try. */
  onLost: () => void;
  onRefused: (problem: ProblemBody) => void;
  onDone: (cubeId: string | null) => void;
}

/** The header passes with the first piece, so that a file that cannot work is refused at once; then larger pieces. */
const FIRST_PIECE = 1024 * 1024;
const PIECE = 16 * 1024 * 1024;

/**
 * Sends one file by tus. Starting again after a loss, a pause or a reload goes on where the server is: the browser
 * remembers the address of a file's upload by region, name, size and time of change.
 */
export async function makeSender(
  file: File,
  regionId: string,
  events: SenderEvents,
  /** Go on with this upload of the server, begun in another browser. */
  uploadId?: string,
): Promise<Upload> {
  const tus = await import('tus-js-client');
  let cubeId: string | null = null;
  const upload: Upload = new tus.Upload(file, {
    endpoint: `${API}/uploads`,
    uploadUrl: uploadId ? `${API}/uploads/${uploadId}` : null,
    metadata: { filename: file.name, regionId },
    chunkSize: FIRST_PIECE,
    retryDelays: null, // waiting and trying again is shown, so it is ours
    removeFingerprintOnSuccess: true,
    fingerprint: async (f) => ['outswell', regionId, f.name, f.size, f.lastModified].join('|'),
    onBeforeRequest: (request) => {
      for (const [name, value] of Object.entries(csrfHeaders())) request.setHeader(name, value);
    },
    onAfterResponse: (_request, response) => {
      cubeId = response.getHeader('Cube-Id') ?? cubeId;
    },
    onUploadUrlAvailable: () => {
      const id = upload.url?.split('/').pop();
      if (id) events.onNamed(id);
    },
    onProgress: (sent) => events.onProgress(sent),
    onChunkComplete: () => {
      upload.options.chunkSize = PIECE;
    },
    onSuccess: () => events.onDone(cubeId),
    onError: (error) => {
      const response = 'originalResponse' in error ? error.originalResponse : null;
      const status = response?.getStatus() ?? 0;
      if (!response || isPassing(status, response.getBody())) events.onLost();
      else events.onRefused(problemFrom(status, response.getBody()).body);
    },
  });
  const [previous] = await upload.findPreviousUploads();
  if (previous && !uploadId) upload.resumeFromPreviousUpload(previous);
  return upload;
}

/** 409 by the protocol: look again how far the server is. 423: another request still holds the file. */
function isPassing(status: number, body: string): boolean {
  if (status === 0 || status === 423 || status === 429) return true;
  if (status === 409) return problemFrom(status, body).type === 'upload-protocol';
  return status >= 500 && status !== 507;
}
