import { ApiProblem, API, csrfHeaders, problemFrom } from '../api';

export interface SendOptions {
  /** 0 … 1: how much of the file has gone out. */
  onProgress?: (fraction: number) => void;
  signal?: AbortSignal;
}

/**
 * Send a file as the body of one request, which fetch can do but not say how far it is.
 *
 * @param path below /api/v1
 * @returns the JSON that is answered
 * @throws ApiProblem as `api` does; the browser's AbortError when the signal fires
 */
export function sendFile<T>(path: string, file: Blob, { onProgress, signal }: SendOptions = {}): Promise<T> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    const stop = () => request.abort();
    request.open('POST', `${API}${path}`);
    const headers = { Accept: 'application/json', 'Content-Type': 'application/fits', ...csrfHeaders() };
    for (const [name, value] of Object.entries(headers)) request.setRequestHeader(name, value);
    request.upload.onprogress = ({ loaded, total }) => onProgress?.(total > 0 ? loaded / total : 0);
    request.onload = () => {
      const { status, responseText } = request;
      if (status >= 200 && status < 300) resolve(JSON.parse(responseText) as T);
      else reject(problemFrom(status, responseText));
    };
    request.onerror = () =>
      reject(
        new ApiProblem({
          type: 'offline',
          status: 0,
          title: 'No connection to Outswell',
          detail: 'The file did not arrive. Look at your connection, then add it again.',
        }),
      );
    const dropped = () => reject(new DOMException('The file was not sent.', 'AbortError'));
    request.onabort = dropped;
    request.onloadend = () => signal?.removeEventListener('abort', stop);
    signal?.addEventListener('abort', stop);
    if (signal?.aborted)
      dropped(); // a request that was never sent says nothing when it is stopped
    else request.send(file);
  });
}
