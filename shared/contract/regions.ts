import { z } from 'zod';
import { Id, Latitude, Longitude, Time, text } from './common';

const centre = z
  .object({ l: Longitude, b: Latitude })
  .nullable()
  .describe('nominal centre, galactic degrees');
const distance = z
  .object({ pc: z.number().positive().max(1e10), errorPc: z.number().min(0).max(1e10).nullable() })
  .nullable()
  .describe('nominal distance of what is studied here');

export const RegionDraft = z
  .strictObject({
    name: text(80),
    description: text(500, 0).default(''),
    centre: centre.default(null),
    distance: distance.default(null),
  })
  .meta({ id: 'RegionDraft' });

export const RegionChange = z
  .strictObject({
    name: text(80).optional(),
    description: text(500, 0).optional(),
    centre: centre.optional(),
    distance: distance.optional(),
  })
  .meta({ id: 'RegionChange' });

export const Region = z
  .object({
    id: Id,
    name: z.string(),
    description: z.string(),
    centre,
    distance,
    counts: z.object({ cubes: z.number().int(), shells: z.number().int() }),
    waiting: z
      .object({
        uploads: z.number().int().describe('uploads begun and not finished'),
        ingesting: z.number().int(),
        failedCubes: z.number().int(),
        runningFits: z.number().int(),
        unfitted: z.number().int().describe('shells that carry marks and have no adopted fit'),
      })
      .describe('what waits for the team here'),
    createdAt: Time,
    updatedAt: Time,
  })
  .meta({ id: 'Region' });

export type RegionDraft = z.infer<typeof RegionDraft>;
export type RegionChange = z.infer<typeof RegionChange>;
export type Region = z.infer<typeof Region>;
