import { z } from 'zod';
import { Id, Time, text } from './common';
import { MODELS, Parameter } from './fits';
import { CATALOGUE_SORT, SHELL_STATUS } from './words';

export const ShellDraft = z
  .strictObject({ name: text(80), note: text(2000, 0).default('') })
  .meta({ id: 'ShellDraft' });
export const ShellChange = z
  .strictObject({
    name: text(80).optional(),
    note: text(2000, 0).optional(),
    adoptedFitId: Id.nullable().optional(),
    status: z.enum(['draft', 'withdrawn']).optional().describe('withdrawing can be undone'),
  })
  .meta({ id: 'ShellChange' });

/** The numbers a catalogue row shows; null where nothing is adopted or no distance is known. */
export const ShellMeasures = z.object({
  l: Parameter,
  b: Parameter,
  theta: Parameter,
  vSys: Parameter,
  vExp: Parameter,
  radius: Parameter.nullable().describe('pc; null without a distance'),
  age: Parameter.nullable().describe('Myr; ageFactor times R over v_exp'),
  ageFactor: z.number(),
  distance: z
    .object({ pc: z.number(), errorPc: z.number().nullable(), source: z.enum(['shell', 'region']) })
    .nullable(),
  chi2PerDof: z.number().nullable(),
  marks: z.number().int(),
  model: z.enum(MODELS),
  warnings: z.array(z.string()).describe('codes'),
});

export const Shell = z
  .object({
    id: Id,
    regionId: Id,
    regionName: z.string(),
    name: z.string(),
    note: z.string(),
    status: z.enum(SHELL_STATUS),
    designation: z.string().nullable().describe('GSH lll±bb±vvv of the adopted fit'),
    adoptedFitId: Id.nullable(),
    adopted: ShellMeasures.nullable(),
    readings: z.array(
      z.object({
        id: Id,
        cubeId: Id,
        person: z.object({ id: Id, name: z.string() }),
        mine: z.boolean(),
        marks: z.number().int(),
        channels: z.number().int(),
        updatedAt: Time,
      }),
    ),
    fits: z.number().int().describe('how many fits of record there are'),
    createdBy: z.object({ id: Id, name: z.string() }).nullable(),
    createdAt: Time,
    updatedAt: Time,
  })
  .meta({ id: 'Shell' });

const number = z.coerce.number().optional();
export const CatalogueQuery = z.object({
  sort: z.enum(CATALOGUE_SORT).default('designation'),
  order: z.enum(['up', 'down']).default('up'),
  region: z.union([Id, z.array(Id)]).optional(),
  status: z.union([z.enum(SHELL_STATUS), z.array(z.enum(SHELL_STATUS))]).optional(),
  search: z.string().max(80).optional(),
  vExpMin: number,
  vExpMax: number,
  radiusMin: number,
  radiusMax: number,
  adopted: z.enum(['yes', 'any']).default('yes').describe('any: shells without an adopted fit too'),
  limit: z.coerce.number().int().min(1).max(500).default(100),
  cursor: z.string().max(200).optional(),
});

export const DistanceDraft = z
  .strictObject({
    pc: z.number().positive().max(1e10),
    errorPc: z.number().min(0).max(1e10).nullable().default(null),
    method: text(120),
    note: text(500, 0).default(''),
  })
  .meta({ id: 'DistanceDraft' });
export const Distance = z
  .object({
    id: Id,
    shellId: Id,
    pc: z.number(),
    errorPc: z.number().nullable(),
    method: z.string(),
    note: z.string(),
    createdBy: z.object({ id: Id, name: z.string() }).nullable(),
    createdAt: Time,
  })
  .meta({ id: 'Distance' });

export type Shell = z.infer<typeof Shell>;
export type ShellMeasures = z.infer<typeof ShellMeasures>;
export type ShellDraft = z.infer<typeof ShellDraft>;
export type ShellChange = z.infer<typeof ShellChange>;
export type CatalogueQuery = z.infer<typeof CatalogueQuery>;
export type Distance = z.infer<typeof Distance>;
export type DistanceDraft = z.infer<typeof DistanceDraft>;
