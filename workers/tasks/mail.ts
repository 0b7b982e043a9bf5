import { z } from 'zod';
import { sendMail } from '@/server/services/mail';
import type { TaskMaker } from './task';

const Payload = z.object({ kind: z.enum(['cube-ready', 'cube-failed']), cubeId: z.uuid() });

export const mail: TaskMaker =
  (parts, { mailer }) =>
  async (payload) => {
    await sendMail(parts, Payload.parse(payload), mailer);
  };
