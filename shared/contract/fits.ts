import { z } from 'zod';
import { Id, ProblemSchema, Time } from './common';

export const MODELS = ['sphere', 'drifting', 'elliptical', 'cap'] as const;
export const FIT_STATUS = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;

export const Parameter = z
  .object({
    value: z.number(),
    se: z.number().nullable().describe('standard error'),
    lo: z.number().nullable().describe('16th percentile; null: unbounded'),
    hi: z.number().nullable().describe('84th percentile; null: unbounded'),
    unit: z.string(),
  })
  .meta({ id: 'Parameter' });

export const FitOptions = z
  .strictObject({
    vSys: z
      .strictObject({ value: z.number(), sigma: z.number().min(0).default(0) })
      .optional()
      .describe('km/s; holds v_sys (sigma 0) or gives it a prior; the cap model needs it'),
    setAside: z.boolean().default(true).describe('set marks aside that lie off their own ring'),
    bootstrap: z
      .number()
      .int()
      .min(0)
      .max(5000)
      .default(0)
      .describe('draws; 0: error bars from the covariance'),
    seed: z.number().int().min(0).max(0xffffffff).default(1),
  })
  .meta({ id: 'FitOptions' });

export const FitDraft = z
  .strictObject({
    readingId: Id,
    model: z.enum(MODELS).default('sphere'),
    options: FitOptions.prefault({}),
  })
  .meta({ id: 'FitDraft' });

const FitRing = z.object({
  channel: z.number().int().nullable(),
  velocity: z.number(),
  theta: z.number().nullable(),
  se: z.number().nullable(),
  marks: z.number().int(),
  model: z.number().nullable().describe('the model radius averaged over the channel, degrees'),
  l: z.number().nullable().optional(),
  b: z.number().nullable().optional(),
});

export const FitProvenance = z.looseObject({
  marks: z.number().int(),
  startValues: z.record(z.string(), z.number().nullable()),
  iterations: z.number().int(),
  seed: z.number().int().nullable(),
  codeVersion: z.string().nullish(),
});

/** What the engine finds; the columns a fit has only once it is done. */
export const FitOutcome = z.looseObject({
  model: z.enum(MODELS),
  parameters: z.record(z.string(), Parameter),
  correlation: z.object({ names: z.array(z.string()), matrix: z.array(z.array(z.number().nullable())) }),
  chi2: z.number(),
  dof: z.number().int(),
  aicc: z.number().nullable(),
  bic: z.number().nullable(),
  errorBars: z.enum(['covariance', 'bootstrap']),
  warnings: z.array(z.object({ code: z.string(), message: z.string() })),
  residuals: z.array(z.object({ mark: z.number().int(), degrees: z.number(), weight: z.number() })),
  rings: z.array(FitRing),
  provenance: FitProvenance,
  extra: z
    .looseObject({
      riseSigma: z
        .number()
        .describe('how far the rings rise above a straight line, in units of a mark error'),
      setAside: z.array(z.number().int()).describe('marks left out of the fit, by index'),
    })
    .describe('what the error bars were made of and what the warnings were judged by'),
});

export const Fit = z
  .looseObject({
    id: Id,
    shellId: Id,
    readingId: Id,
    cubeId: Id,
    model: z.enum(MODELS),
    status: z.enum(FIT_STATUS),
    problem: ProblemSchema.nullable(),
    adopted: z.boolean(),
    adoptable: z.boolean().describe('false where the marks do not measure the radius'),
    createdBy: z.object({ id: Id, name: z.string() }).nullable(),
    createdAt: Time,
    finishedAt: Time.nullable(),
  })
  .and(FitOutcome.partial())
  .meta({ id: 'Fit', description: 'immutable once done; the outcome is absent until then' });

export const FrozenMark = z.object({
  channel: z.number().int(),
  x: z.number(),
  y: z.number(),
  l: z.number(),
  b: z.number(),
  velocity: z.number(),
  sigma: z.number().nullable(),
});
export const FrozenMarks = z
  .object({ cubeId: Id, channelWidth: z.number(), marks: z.array(FrozenMark) })
  .meta({ id: 'FrozenMarks' });

export type ModelName = (typeof MODELS)[number];
export type Parameter = z.infer<typeof Parameter>;
export type FitOptions = z.infer<typeof FitOptions>;
export type FitDraft = z.infer<typeof FitDraft>;
export type FitOutcome = z.infer<typeof FitOutcome>;
export type Fit = z.infer<typeof Fit>;
export type FrozenMark = z.infer<typeof FrozenMark>;
export type FrozenMarks = z.infer<typeof FrozenMarks>;
