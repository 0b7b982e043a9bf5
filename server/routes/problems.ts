import type { ErrorRequestHandler, Request, RequestHandler, Response } from 'express';
import { ZodError, type z } from 'zod';
import { isProblem, Problem, type ProblemBody } from '@/shared/contract/problem';

export const PROBLEM_TYPE = 'application/problem+json';

export const sendProblem = (res: Response, body: ProblemBody) =>
  res.status(body.status).type(PROBLEM_TYPE).send(JSON.stringify(body));

/** The one place where an error becomes an answer. What we did not foresee is told by its request id alone. */
export const problemHandler: ErrorRequestHandler = (error: unknown, req, res, next) => {
  if (res.headersSent) return next(error);
  const problem = toProblem(error);
  if (problem) {
    sendProblem(res, problem.toJSON());
    return;
  }
  req.log.error({ error }, 'a request failed');
  sendProblem(res, unforeseen(String(req.id)).toJSON());
};

export const unforeseen = (requestId: string) =>
  new Problem(
    'internal',
    `Try again. If it stays so, tell whoever runs this server the number ${requestId}.`,
    {
      requestId,
    },
  );

/** A problem as such, a schema's complaint, or what a body parser found; undefined for anything else. */
export function toProblem(error: unknown): Problem | undefined {
  if (isProblem(error)) return error;
  if (error instanceof ZodError) return fromZod(error);
  const { type, status } = error as { type?: string; status?: number };
  if (type === 'entity.parse.failed')
    return new Problem(
      'malformed-json',
      'The body of the request is not JSON. NaN and Infinity are not JSON numbers: leave such marks out.',
    );
  if (type === 'entity.too.large') return new Problem('too-large', 'The request is larger than 8 MB.');
  if (typeof type === 'string' && status && status < 500)
    return new Problem('invalid-input', 'The request cannot be read.', { reason: type });
  return undefined;
}

function fromZod(error: ZodError): Problem {
  const [first] = error.issues;
  const field = first!.path.join('.');
  const more = error.issues.length - 1;
  const also = more > 0 ? ` ${more} more ${more === 1 ? 'field is' : 'fields are'} wrong too.` : '';
  return new Problem('invalid-input', `${field || 'The body'}: ${first!.message}.${also}`, {
    field,
    issues: error.issues.map((i) => ({ field: i.path.join('.'), message: i.message })),
  });
}

/** Parse what came in by its contract; the error handler shapes a refusal. */
export const parse = <S extends z.ZodType>(schema: S, input: unknown): z.infer<S> =>
  schema.parse(input ?? {});

/** An id in the address: anything that is not one is simply not there. */
export function idOf(req: Request, name: string): string {
  const value = String(req.params[name] ?? '');
  if (!/^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i.test(value))
    throw new Problem('not-found', 'There is nothing at this address.');
  return value;
}

export const nothingHere: RequestHandler = (req) => {
  throw new Problem(
    'not-found',
    `There is no ${req.method} ${req.path} in this API. See /api/v1/openapi.json.`,
  );
};
