import { z } from 'zod';
import { Id, ProblemSchema, Time } from './common';
import { Mark } from './readings';

export const MODELS = ['sphere', 'drifting', 'elliptical', 'cap'] as const;
export const FIT_STATUS = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;

export const PARAMETERS = [
  'l',
  'b',
  'theta',
  'vSys',
  'vExp',
  'driftL',
  'driftB',
  'axisRatio',
  'positionAngle',
] as const;

/** What is said of a parameter before the fit, in the parameter's own unit. */
export const Constraint = z
  .strictObject({
    fixed: z.number().optional().describe('held at this value; excludes the others'),
    prior: z
      .strictObject({ mean: z.number(), sd: z.number().positive() })
      .optional()
      .describe('a Gaussian prior: counts as one more datum'),
    low: z.number().optional().describe('the fit looks no lower'),
    high: z.number().optional().describe('the fit looks no higher'),
  })
  .meta({ id: 'Constraint' });

export const Parameter = z
  .object({
    value: z.number(),
    se: z.number().nullable().describe('standard error'),
    lo: z.number().nullable().describe('16th percentile; null: unbounded'),
    hi: z.number().nullable().describe('84th percentile; null: unbounded'),
    unit: z.string(),
    constraint: Constraint.optional().describe('what was said of it before the fit; absent: free'),
    atBound: z.enum(['low', 'high']).optional().describe('the fit ended at this bound'),
  })
  .meta({ id: 'Parameter' });

export const FitOptions = z
  .strictObject({
    vSys: z
      .strictObject({ value: z.number(), sigma: z.number().min(0).default(0) })
      .optional()
      .describe('km/s; the same as constraints.vSys: holds v_sys (sigma 0) or gives it a prior'),
    constraints: z
      .partialRecord(z.enum(PARAMETERS), Constraint)
      .optional()
      .describe('parameters held, bounded or under a prior; the cap model needs vSys held or under a prior'),
    start: z
      .strictObject({ theta: z.number().positive().lt(90), vSys: z.number(), vExp: z.number().positive() })
      .optional()
      .describe(
        'begin here, such as with a model set by hand; by default the start is worked out from the marks',
      ),
    setAside: z.boolean().default(true).describe('set marks aside that lie off their own ring'),
    bootstrap: z
      .number()
      .int()
      .min(0)
      .max(5000)
      .default(500)
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

export const Convergence = z
  .object({
    reason: z.enum(['settled', 'at-bound', 'iterations', 'no-progress']),
    sentence: z.string(),
  })
  .meta({ id: 'Convergence', description: 'why the fit stopped' });

export const Profile = z
  .object({
    parameter: z.enum(['theta', 'vExp']),
    values: z.array(z.number()),
    deltaChi2: z
      .array(z.number())
      .describe('chi2 above its least, the other parameters refitted, over the scale of the marks'),
  })
  .meta({ id: 'Profile' });

export const LeftOut = z
  .object({
    channel: z.number().int().nullish(),
    velocity: z.number(),
    marks: z.number().int(),
    shift: z.record(z.string(), z.number()).describe('value without this channel less the value with it'),
    shiftInSe: z.record(z.string(), z.number().nullable()).describe('that shift over the standard error'),
    score: z
      .number()
      .nullable()
      .describe('mean squared scaled residual of the channel under the fit without it'),
    problem: z.string().optional().describe('why there is no fit without this channel'),
  })
  .meta({ id: 'LeftOut' });

export const Comparison = z
  .object({
    models: z.array(
      z.object({
        model: z.enum(MODELS),
        chi2: z.number().nullable(),
        dof: z.number().int().nullable(),
        aicc: z.number().nullable(),
        bic: z.number().nullable(),
        leaveOneOut: z.number().nullable().describe('mean of the channel scores'),
        wald: z
          .object({ f: z.number(), dof: z.number(), probability: z.number() })
          .nullable()
          .describe("the model's two extra parameters against the sphere's zeros"),
        parameters: z.record(z.string(), Parameter).nullable(),
        problem: z.string().optional().describe('why this model could not be fitted'),
        sentence: z.string().describe('what the marks say of it, in words'),
      }),
    ),
  })
  .meta({ id: 'Comparison', description: 'the same marks under other models' });

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
      convergence: Convergence.optional(),
      profiles: z.array(Profile).optional(),
      leaveOneOut: z.array(LeftOut).optional(),
      comparison: Comparison.optional(),
    })
    .describe('what the error bars were made of and what the warnings were judged by'),
});

export const Fit = z
  .looseObject({
    id: Id,
    shellId: Id,
    readingId: Id,
    readingRevision: z.number().int().describe('of the marks, as they were frozen'),
    cubeId: Id,
    model: z.enum(MODELS),
    status: z.enum(FIT_STATUS),
    progress: z.number().min(0).max(1).nullable().describe('while it runs'),
    activity: z.string().nullable().describe('what it is doing, in words'),
    options: FitOptions,
    traceId: Id.nullable().describe('set where the marks are a traced rim'),
    problem: ProblemSchema.nullable(),
    adopted: z.boolean(),
    adoptable: z.boolean().describe('false where the marks do not measure the radius'),
    createdBy: z.object({ id: Id, name: z.string() }).nullable(),
    createdAt: Time,
    finishedAt: Time.nullable(),
  })
  .and(FitOutcome.partial())
  .meta({ id: 'Fit', description: 'immutable once done; the outcome is absent until then' });

/** A mark as it was, with its place on the sky. */
export const FrozenMark = Mark.omit({ sigma: true }).extend({
  l: z.number(),
  b: z.number(),
  velocity: z.number(),
  sigma: z.number().nullable(),
});
export const FrozenMarks = z
  .object({ cubeId: Id, channelWidth: z.number(), marks: z.array(FrozenMark) })
  .meta({ id: 'FrozenMarks' });

export const FitDraws = z
  .object({
    names: z.array(z.string()),
    rows: z.array(z.array(z.number().nullable())).describe('one row a draw; null: unbounded'),
  })
  .meta({ id: 'FitDraws', description: 'the draws of the bootstrap' });

export type ModelName = (typeof MODELS)[number];
export type ParameterName = (typeof PARAMETERS)[number];
export type Constraint = z.infer<typeof Constraint>;
export type Constraints = Partial<Record<ParameterName, Constraint>>;
export type Convergence = z.infer<typeof Convergence>;
export type Profile = z.infer<typeof Profile>;
export type LeftOut = z.infer<typeof LeftOut>;
export type Comparison = z.infer<typeof Comparison>;
export type FitDraws = z.infer<typeof FitDraws>;
export type Parameter = z.infer<typeof Parameter>;
export type FitOptions = z.infer<typeof FitOptions>;
export type FitDraft = z.infer<typeof FitDraft>;
export type FitOutcome = z.infer<typeof FitOutcome>;
export type Fit = z.infer<typeof Fit>;
export type FrozenMark = z.infer<typeof FrozenMark>;
export type FrozenMarks = z.infer<typeof FrozenMarks>;
