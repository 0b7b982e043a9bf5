import type { ProblemBody } from '@/shared/contract/problem';

/** A problem+json answer, or a connection that did not stand (status 0); what hooks throw and notices show. */
export class ApiProblem extends Error {
  constructor(readonly body: ProblemBody) {
    super(body.detail || body.title);
    this.name = 'ApiProblem';
  }
  /** The last part of the type: 'fits-card'. */
  get type(): string {
    return this.body.type.split('/').pop() ?? '';
  }
  get title(): string {
    return this.body.title;
  }
  get status(): number {
    return this.body.status;
  }
  get detail(): string {
    return this.body.detail;
  }
  get field(): string | undefined {
    return this.body.field;
  }
  get card(): string | undefined {
    return this.body.card;
  }
}

export const API = '/api/v1';

let csrfToken: string | null = null;
/** useMe hands the session's token over here; every write carries it. */
export const setCsrfToken = (token: string | null) => {
  csrfToken = token;
};
export const csrfHeaders = (): Record<string, string> => (csrfToken ? { 'X-CSRF-Token': csrfToken } : {});

const lostListeners = new Set<() => void>();
/** Called when the server no longer knows the session. */
export function onSignedOut(listener: () => void): () => void {
  lostListeners.add(listener);
  return () => void lostListeners.delete(listener);
}

export interface Request {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Sent as JSON. */
  body?: unknown;
  signal?: AbortSignal;
  headers?: Record<string, string>;
}

/** A path of the API below /api/v1, or from the root when it begins with /api or /auth. */
export const address = (path: string): string => (/^\/(api|auth)\//.test(path) ? path : `${API}${path}`);

/**
 * One request; throws ApiProblem for every answer that is not a success. An aborted request throws the browser's
 * AbortError, which is nobody's mistake.
 */
export async function apiResponse(
  path: string,
  { method = 'GET', body, signal, headers }: Request = {},
): Promise<Response> {
  let answer: Response;
  try {
    answer = await fetch(address(path), {
      method,
      signal,
      credentials: 'same-origin',
      headers: {
        Accept: 'application/json, application/problem+json, */*',
        ...(body !== undefined && { 'Content-Type': 'application/json' }),
        ...(method !== 'GET' && csrfHeaders()),
        ...headers,
      },
      body: body === undefined ? undefined : JSON.stringify(body),
    });
  } catch (error) {
    if (error instanceof Error && error.name === 'AbortError') throw error;
    throw new ApiProblem({
      type: 'offline',
      status: 0,
      title: 'No connection to Outswell',
      detail: 'The server did not answer. Look at your connection, then try again.',
    });
  }
  if (answer.ok) return answer;
  const problem = await readProblem(answer);
  if (problem.status === 401) for (const listener of lostListeners) listener();
  throw problem;
}

/** A JSON answer; undefined for 204. */
export async function api<T>(path: string, request?: Request): Promise<T> {
  const answer = await apiResponse(path, request);
  if (answer.status === 204) return undefined as T;
  return (await answer.json()) as T;
}

async function readProblem(answer: Response): Promise<ApiProblem> {
  return problemFrom(answer.status, await answer.text().catch(() => ''));
}

/** The problem in an answer's text, or a general one where the text is something else (a proxy's page). */
export function problemFrom(status: number, text: string): ApiProblem {
  try {
    const body = JSON.parse(text) as Partial<ProblemBody>;
    if (typeof body.title === 'string')
      return new ApiProblem({ type: 'about:blank', detail: '', status, ...body } as ProblemBody);
  } catch {
    /* not JSON */
  }
  return new ApiProblem({
    type: 'about:blank',
    status,
    title: status >= 500 ? 'Outswell is not answering as it should' : 'The request was refused',
    detail: `The server answered ${status}. Try again; if it goes on, tell who runs this installation.`,
  });
}

/** Any thrown value as something a notice can show. */
export function asProblem(error: unknown): ApiProblem {
  if (error instanceof ApiProblem) return error;
  return new ApiProblem({
    type: 'internal',
    status: 0,
    title: 'Something went wrong on this page',
    detail: error instanceof Error ? error.message : String(error),
  });
}
