import { z } from 'zod';
import { giveUpTrace, runTrace } from '@/server/services/runTrace';
import { tracer } from '../threads';
import { isLastAttempt, causeOf, type TaskMaker } from './task';

const Payload = z.object({ traceId: z.uuid() });

export const trace: TaskMaker =
  (parts, { pool, holder, stopping }) =>
  async (payload, helpers) => {
    const { traceId } = Payload.parse(payload);
    const lease = holder(helpers.job.id);
    try {
      await runTrace(parts, traceId, lease, tracer(pool), stopping);
    } catch (error) {
      if (isLastAttempt(helpers)) await giveUpTrace(parts, traceId, lease, causeOf(error));
      throw error;
    }
  };
