import { z } from 'zod';
import { giveUpIngest, ingestCube } from '@/server/services/ingest';
import { cubeThreads } from '../threads';
import { isLastAttempt, causeOf, type TaskMaker } from './task';

const Payload = z.object({ cubeId: z.uuid() });

export const ingest: TaskMaker =
  (parts, { pool, holder, stopping }) =>
  async (payload, helpers) => {
    const { cubeId } = Payload.parse(payload);
    const lease = holder(helpers.job.id);
    try {
      await ingestCube(parts, cubeId, lease, cubeThreads(pool), stopping);
    } catch (error) {
      if (isLastAttempt(helpers)) await giveUpIngest(parts, cubeId, lease, causeOf(error));
      throw error;
    }
  };
