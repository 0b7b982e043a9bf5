import type { JobHelpers, Task } from 'graphile-worker';
import type Piscina from 'piscina';
import type { Mailer } from '@/server/services/mail';
import type { Parts } from '@/server/services/context';

export interface Hands {
  pool: Piscina;
  mailer: Mailer;
  /** The name under which this worker holds the record of a job. */
  holder: (jobId: string) => string;
  /** Fires when this worker is asked to stop. */
  stopping: AbortSignal;
}

/** A task is thin: it parses its payload and calls a service. */
export type TaskMaker = (parts: Parts, hands: Hands) => Task;

export const isLastAttempt = ({ job }: JobHelpers): boolean => job.attempts >= job.max_attempts;

export const causeOf = (error: unknown): string => (error instanceof Error ? error.message : String(error));
