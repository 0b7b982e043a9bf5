/**
 * The catalogue of errors a person or a script can meet, and the one class that carries them.
 *
 * Free of zod on purpose, so that shared/fits, shared/shell and the screens may throw and read problems
 * without loading a schema library. The wire format is RFC 9457 (application/problem+json).
 */
export const PROBLEMS = {
  'not-signed-in': { status: 401, title: 'Sign in first' },
  'not-allowed': { status: 403, title: 'Your role does not allow this' },
  csrf: { status: 403, title: 'This page is out of date' },
  'not-found': { status: 404, title: 'Nothing here' },
  'invalid-input': { status: 422, title: 'Something in the request cannot be used' },
  'malformed-json': { status: 400, title: 'The request is not valid JSON' },
  'stale-revision': { status: 409, title: 'Someone saved a newer version' },
  conflict: { status: 409, title: 'This does not fit the present state' },
  'duplicate-file': { status: 409, title: 'This file is already in the region' },
  'too-large': { status: 413, title: 'The file is larger than this installation allows' },
  'disk-full': { status: 507, title: 'There is no room for this file' },
  'rate-limited': { status: 429, title: 'Too many requests' },
  'not-fits': { status: 422, title: 'This is not a FITS file' },
  'fits-card': { status: 422, title: 'A header card cannot be used' },
  'fits-shape': { status: 422, title: 'This FITS image is not a spectral-line cube' },
  'fits-image': { status: 422, title: 'This FITS file is not an image of the sky' },
  'compressed-damaged': { status: 422, title: 'The compressed data are damaged' },
  'fits-truncated': { status: 422, title: 'The file ends before its data do' },
  'upload-protocol': { status: 400, title: 'The upload request cannot be used' },
  'marks-insufficient': { status: 422, title: 'These marks cannot constrain a shell' },
  'marks-degenerate': { status: 422, title: 'These marks do not trace a ring' },
  'fit-failed': { status: 422, title: 'The fit did not settle' },
  'ingest-failed': { status: 500, title: 'Reading the cube failed' },
  unavailable: { status: 503, title: 'A part of Outswell is not running' },
  internal: { status: 500, title: 'Something went wrong on our side' },
} as const satisfies Record<string, { status: number; title: string }>;

export type ProblemType = keyof typeof PROBLEMS;

export interface ProblemExtra {
  /** Path of the offending field in the request, as in `marks.3.x`. */
  field?: string;
  /** The FITS card at fault. */
  card?: string;
  /** Anything a client needs to go on, such as both sides of a conflict. */
  [key: string]: unknown;
}

export interface ProblemBody extends ProblemExtra {
  type: string;
  title: string;
  status: number;
  detail: string;
}

/** An error with a stable type and a sentence that says what was found and what to do. */
export class Problem extends Error {
  readonly status: number;
  readonly title: string;
  constructor(
    readonly type: ProblemType,
    readonly detail: string,
    readonly extra: ProblemExtra = {},
  ) {
    super(detail);
    this.name = 'Problem';
    this.status = PROBLEMS[type].status;
    this.title = PROBLEMS[type].title;
  }

  /** The problem+json body. `type` is a path, so that it resolves against whatever host serves the API. */
  toJSON(): ProblemBody {
    return {
      type: `/problems/${this.type}`,
      title: this.title,
      status: this.status,
      detail: this.detail,
      ...this.extra,
    };
  }
}

export const isProblem = (error: unknown): error is Problem => error instanceof Problem;
