import type { z } from 'zod';

export interface Endpoint {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete' | 'head';
  /** Express path below /api/v1, with `:name` parameters. */
  path: string;
  summary: string;
  /** true: answers without sign-in. */
  open?: boolean;
  query?: z.ZodObject;
  body?: z.ZodType;
  /** The body is a file as it is, of one of these media types. */
  binaryBody?: readonly string[];
  /** Status and body of success; `binary` names a media type that is not JSON. */
  answer: { status: number; schema?: z.ZodType; binary?: string };
}
