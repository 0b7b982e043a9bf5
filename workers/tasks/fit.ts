import { z } from 'zod';
import { giveUpFit, runFit } from '@/server/services/runFit';
import { solver } from '../fitThreads';
import { isLastAttempt, causeOf, type TaskMaker } from './task';

const Payload = z.object({ fitId: z.uuid() });

export const fit: TaskMaker =
  (parts, { pool, holder, stopping }) =>
  async (payload, helpers) => {
    const { fitId } = Payload.parse(payload);
    const lease = holder(helpers.job.id);
    try {
      await runFit(parts, fitId, lease, solver(pool), stopping);
    } catch (error) {
      if (isLastAttempt(helpers)) await giveUpFit(parts, fitId, lease, causeOf(error));
      throw error;
    }
  };
