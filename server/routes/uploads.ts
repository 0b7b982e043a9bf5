import { randomUUID } from 'node:crypto';
import { Server, type ServerOptions } from '@tus/server';
import type { Request, Response, RequestHandler } from 'express';
import { isProblem, Problem } from '@/shared/contract/problem';
import { contextOf } from '../auth/requests';
import type { Parts } from '../services/context';
import { CheckedStore } from '../services/uploadStore';
import * as uploads from '../services/uploads';
import { PROBLEM_TYPE, toProblem, unforeseen } from './problems';

export const UPLOADS_PATH = '/api/v1/uploads';

type WebRequest = Parameters<NonNullable<ServerOptions['onUploadFinish']>>[0];
const expressRequest = (req: WebRequest): Request =>
  (req as unknown as { runtime: { node: { req: Request } } }).runtime.node.req;

/** Resumable uploads by tus 1.0, in front of any body parser. */
export function uploadHandler(parts: Parts): RequestHandler {
  const tus = new Server({
    path: UPLOADS_PATH,
    relativeLocation: true,
    datastore: new CheckedStore(parts),
    maxSize: parts.config.maxUploadBytes,
    namingFunction: () => randomUUID(),
    async onIncomingRequest(req, id) {
      const ctx = contextOf(expressRequest(req));
      if (req.method !== 'POST' && req.method !== 'OPTIONS') await uploads.myUpload(ctx, id);
    },
    async onUploadCreate(req, upload) {
      const { regionId, filename } = upload.metadata ?? {};
      await uploads.beginUpload(contextOf(expressRequest(req)), {
        id: upload.id,
        regionId,
        fileName: filename,
        size: upload.size,
      });
      return {};
    },
    async onUploadFinish(_req, upload) {
      return { headers: { 'Cube-Id': await uploads.finishUpload(parts, upload.id) } };
    },
    onResponseError: (req, error) => shape(expressRequest(req), error),
  });
  return async (req, res) => {
    labelProblems(res);
    endWithCallback(res);
    await tus.handle(req, res);
    // also where the bytes were never there: a server killed while an upload began leaves its record alone
    if (req.method === 'DELETE' && [204, 404].includes(res.statusCode))
      await uploads.cancelUpload(contextOf(req), String(req.path.split('/').pop()));
  };
}

/** The protocol's own refusals and ours, in one form. */
function shape(req: Request, error: unknown): { status_code: number; body: string } {
  const problem = isProblem(error) ? error : (fromProtocol(error) ?? toProblem(error) ?? report(req, error));
  const body = problem.toJSON();
  const { status_code } = error as { status_code?: number };
  // where the protocol names a status its clients act on it: 409 look again, 412 other version, 460 checksum
  const status = problem.type === 'upload-protocol' && status_code ? status_code : problem.status;
  return { status_code: status, body: JSON.stringify({ ...body, status }) };
}

function fromProtocol(error: unknown): Problem | undefined {
  const { status_code, body } = error as { status_code?: number; body?: string };
  if (typeof status_code !== 'number' || status_code >= 500) return undefined;
  if (status_code === 413)
    return new Problem(
      'too-large',
      'Cut the cube to the channels and the sky that you need, or ask whoever runs this server.',
    );
  if (status_code === 404 || status_code === 410)
    return new Problem('not-found', 'There is no such upload any more. Begin it again.');
  return new Problem('upload-protocol', `The upload protocol refused: ${(body ?? '').trim()}.`);
}

function report(req: Request, error: unknown): Problem {
  req.log.error({ error }, 'an upload failed');
  return unforeseen(String(req.id));
}

/** The library answers errors as plain text; ours are problem+json, whoever writes the head. */
function labelProblems(res: Response) {
  const writeHead = res.writeHead.bind(res) as (...args: unknown[]) => Response;
  res.writeHead = ((status: number, ...rest: unknown[]) => {
    const headers = rest.find((r) => Array.isArray(r)) as string[] | undefined;
    if (status >= 400 && headers) {
      const at = headers.findIndex((h, i) => i % 2 === 0 && h.toLowerCase() === 'content-type');
      if (at >= 0) headers[at + 1] = PROBLEM_TYPE;
      else headers.push('content-type', PROBLEM_TYPE);
    }
    return writeHead(status, ...rest);
  }) as typeof res.writeHead;
}

/** The library ends an answer with a callback alone, which express-session takes for a body. */
function endWithCallback(res: Response) {
  const end = res.end.bind(res) as (...args: unknown[]) => Response;
  res.end = ((...args: unknown[]) => {
    if (typeof args[0] !== 'function') return end(...args);
    res.once('finish', args[0] as () => void);
    return end();
  }) as typeof res.end;
}
