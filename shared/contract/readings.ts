import { z } from 'zod';
import { Id, Time } from './common';

export const Mark = z
  .strictObject({
    id: z
      .string()
      .min(1)
      .max(40)
      .optional()
      .describe('made by the client; keeps a mark itself through a merge'),
    channel: z.number().int().min(0),
    x: z.number().describe('pixel, 0 at the centre of the first'),
    y: z.number(),
    sigma: z.number().positive().max(90).optional().describe('position error in degrees'),
    unsure: z.literal(true).optional().describe('the person is not sure of it'),
    note: z.string().max(500).optional(),
    placed: z
      .enum(['hand', 'suggested', 'ring'])
      .optional()
      .describe('by hand (also where absent), a suggestion that was taken, or from a drawn ring'),
  })
  .meta({ id: 'Mark' });

export const MAX_MARKS = 20_000;

export const ReadingDraft = z
  .strictObject({
    cubeId: Id,
    marks: z.array(Mark).max(MAX_MARKS),
    revision: z.number().int().min(0).describe('the revision this builds on; 0 where there is none yet'),
  })
  .meta({ id: 'ReadingDraft' });

export const Reading = z
  .object({
    id: Id.nullable().describe('null while nothing was saved'),
    shellId: Id,
    cubeId: Id.nullable(),
    marks: z.array(Mark),
    revision: z.number().int(),
    updatedAt: Time.nullable(),
  })
  .meta({ id: 'Reading' });

export type Mark = z.infer<typeof Mark>;
export type ReadingDraft = z.infer<typeof ReadingDraft>;
export type Reading = z.infer<typeof Reading>;
