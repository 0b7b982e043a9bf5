import { Upload } from 'tus-js-client';
import type { ProblemBody } from '@/shared/contract/problem';

/** What the server refused, in its own words. */
export class Refused extends Error {
  constructor(
    what: string,
    readonly status: number,
    readonly problem: Partial<ProblemBody> | null,
  ) {
    super(
      `${what} was answered ${status}: ${problem?.title ?? 'no reason given'}. ${problem?.detail ?? ''}`.trim(),
    );
    this.name = 'Refused';
  }
}

/** Somebody signed in over HTTP, as a browser would be. Paths are below /api/v1. */
export interface Client {
  login: string;
  get<T>(path: string): Promise<T>;
  send<T>(method: 'POST' | 'PUT' | 'PATCH' | 'DELETE', path: string, body?: object): Promise<T>;
  /** All items of a list. */
  list<T>(path: string): Promise<T[]>;
  /** Sends a file by the resumable protocol; the id of the cube it became. */
  upload(regionId: string, fileName: string, bytes: Uint8Array): Promise<string>;
  /** Gives up an upload that was begun. */
  cancelUpload(uploadId: string): Promise<void>;
}

/** The authorization-code flow as a browser walks it: provider page, choice, code, callback, session. */
export async function signIn(base: string, login: string): Promise<Client> {
  const cookies = new Map<string, string>();
  const cookieHeader = () => [...cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  const request = async (path: string, init: RequestInit = {}): Promise<Response> => {
    const cookie = cookieHeader();
    // making a cube blocks this process for longer than the server keeps an idle connection open
    const headers = {
      ...(init.headers as Record<string, string>),
      ...(cookie && { cookie }),
      connection: 'close',
    };
    const response = await fetch(new URL(path, base), { ...init, headers, redirect: 'manual' }).catch(
      (error: Error) => {
        throw new Error(
          `${base} does not answer (${(error.cause as Error | undefined)?.message ?? error.message})`,
        );
      },
    );
    for (const line of response.headers.getSetCookie()) {
      const [, name, value] = /^([^=]+)=([^;]*)/.exec(line) ?? [];
      if (name) cookies.set(name, value!);
    }
    return response;
  };
  const onward = (response: Response): URL => {
    const location = response.headers.get('location');
    if (response.status !== 302 || location === null)
      throw new Error(`signing ${login} in: ${new URL(response.url).pathname} answered ${response.status}`);
    return new URL(location, base);
  };
  const provider = onward(await request('/auth/github'));
  const choice = new URLSearchParams([...provider.searchParams, ['login', login]]);
  const back = onward(await request(provider.pathname, { method: 'POST', body: choice }));
  onward(await request(back.pathname + back.search));

  const call = async <T>(method: string, path: string, body?: object): Promise<T> => {
    const headers = { 'x-csrf-token': csrf, ...(body && { 'content-type': 'application/json' }) };
    const response = await request(`/api/v1${path}`, { method, headers, body: body && JSON.stringify(body) });
    const text = await response.text();
    if (!response.ok) throw new Refused(`${method} ${path}`, response.status, problemOf(text));
    return (text === '' ? undefined : JSON.parse(text)) as T;
  };
  let csrf = '';
  const { csrfToken } = await call<{ csrfToken: string }>('GET', '/me');
  csrf = csrfToken;

  const uploadHeaders = () => ({ cookie: cookieHeader(), 'x-csrf-token': csrf });

  return {
    login,
    get: (path) => call('GET', path),
    send: call,
    async list<T>(path: string) {
      const items: T[] = [];
      let next: string | null = null;
      do {
        const query: string =
          next === null ? '' : `${path.includes('?') ? '&' : '?'}cursor=${encodeURIComponent(next)}`;
        const page: { items: T[]; next: string | null } = await call('GET', path + query);
        items.push(...page.items);
        next = page.next;
      } while (next !== null);
      return items;
    },
    upload: (regionId, fileName, bytes) =>
      sendFile(new URL('/api/v1/uploads', base), Buffer.from(bytes.buffer, bytes.byteOffset, bytes.length), {
        metadata: { filename: fileName, regionId },
        headers: uploadHeaders(),
      }),
    cancelUpload: (id) =>
      Upload.terminate(new URL(`/api/v1/uploads/${id}`, base).href, { headers: uploadHeaders() }),
  };
}

interface Sending {
  metadata: Record<string, string>;
  headers: Record<string, string>;
}

const sendFile = (endpoint: URL, bytes: Buffer, { metadata, headers }: Sending): Promise<string> =>
  new Promise((resolve, reject) => {
    let cubeId: string | undefined;
    const upload = new Upload(bytes, {
      endpoint: endpoint.href,
      metadata,
      headers,
      chunkSize: 4 * 2 ** 20,
      retryDelays: [200, 1000, 3000],
      onAfterResponse: (_request, response) => {
        cubeId = response.getHeader('Cube-Id') ?? cubeId;
      },
      onSuccess: () =>
        cubeId ? resolve(cubeId) : reject(new Error(`${metadata.filename} was sent, but no cube came of it`)),
      onError: (error) => {
        const response = 'originalResponse' in error ? error.originalResponse : null;
        const refused =
          response &&
          new Refused(`sending ${metadata.filename}`, response.getStatus(), problemOf(response.getBody()));
        reject(refused ?? error);
      },
    });
    upload.start();
  });

function problemOf(text: string): ProblemBody | null {
  try {
    return JSON.parse(text) as ProblemBody;
  } catch {
    return null;
  }
}
