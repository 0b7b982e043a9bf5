import { z } from 'zod';
import { Id } from './common';

/** What GET /events sends: that something changed, never its content; a screen asks again for what it shows. */
export const LiveEvent = z
  .object({
    subject: z.enum(['region', 'upload', 'cube', 'shell', 'reading', 'fit', 'trace']),
    id: z.string(),
    regionId: Id.nullable(),
    shellId: Id.nullable().optional(),
    status: z.string().optional(),
    progress: z.number().optional(),
    activity: z.string().nullable().optional(),
  })
  .meta({ id: 'LiveEvent' });
export type LiveEvent = z.infer<typeof LiveEvent>;

export const Health = z
  .object({
    status: z.enum(['ok', 'degraded']),
    database: z.enum(['ok', 'down']),
    queue: z
      .object({ waiting: z.number().int(), running: z.number().int(), workers: z.number().int() })
      .nullable(),
    version: z.string(),
  })
  .meta({ id: 'Health' });
export type Health = z.infer<typeof Health>;
