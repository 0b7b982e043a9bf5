import { z } from 'zod';
import { Id, ProblemSchema, Time } from './common';
import { FIT_STATUS } from './fits';

export const EDGES = ['ridge', 'inner'] as const;

/** One sector of azimuth on one channel: where the rim was found there, or why it was not. */
export const TracedSector = z
  .object({
    channel: z.number().int(),
    velocity: z.number().describe('km/s'),
    azimuth: z.number().describe('degrees from galactic north through east, about the centre of the fit'),
    predicted: z.number().describe('radius that the fit expects on this channel, degrees'),
    radius: z.number().nullable().describe('radius found, degrees; null where no rim was found'),
    l: z.number().nullable(),
    b: z.number().nullable(),
    x: z.number().nullable().describe('pixel'),
    y: z.number().nullable(),
    sigma: z.number().nullable().describe('position error along the radius, degrees'),
    rejected: z
      .enum(['outside', 'blank', 'faint', 'at-end'])
      .nullable()
      .describe(
        'off the map; blank pixels; does not stand above the noise; highest at the end of the window',
      ),
  })
  .meta({ id: 'TracedSector' });

export const TraceOutcome = z.object({
  sectors: z.array(TracedSector),
  seen: z.number().describe('share of the sectors in which a rim was found, 0 to 1'),
  seenByChannel: z.array(z.object({ channel: z.number().int(), velocity: z.number(), seen: z.number() })),
  noise: z.number().describe("noise of a channel used, in the cube's unit"),
  beamDeg: z.number().describe('beam used, degrees'),
  beamAssumed: z.literal(true).optional().describe('the header gives no beam: three pixels were taken'),
  faint: z.boolean().describe('the rim stands little above the noise: wider error bars'),
});

export const TraceDraft = z
  .strictObject({ fitId: Id, edge: z.enum(EDGES).default('ridge') })
  .meta({ id: 'TraceDraft' });

export const Trace = z
  .object({
    id: Id,
    shellId: Id,
    fitId: Id.describe('the fit that it starts from'),
    cubeId: Id,
    edge: z.enum(EDGES),
    status: z.enum(FIT_STATUS),
    progress: z.number().min(0).max(1).nullable().describe('while it runs'),
    problem: ProblemSchema.nullable(),
    readingId: Id.nullable().describe('the reading made of the rim that was found, once done'),
    createdBy: z.object({ id: Id, name: z.string() }).nullable(),
    createdAt: Time,
    finishedAt: Time.nullable(),
    outcome: TraceOutcome.nullable(),
  })
  .meta({ id: 'Trace', description: 'the rim measured from the brightness itself' });

export type Edge = (typeof EDGES)[number];
export type TracedSector = z.infer<typeof TracedSector>;
export type TraceOutcome = z.infer<typeof TraceOutcome>;
export type TraceDraft = z.infer<typeof TraceDraft>;
export type Trace = z.infer<typeof Trace>;
