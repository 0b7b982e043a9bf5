import { z } from 'zod';

export const Id = z.uuid();
export const Time = z.iso.datetime({ offset: true });
export const Longitude = z.number().min(-360).max(360).describe('degrees');
export const Latitude = z.number().min(-90).max(90).describe('degrees');

/** A list answer: `next` is an opaque cursor, null on the last page. */
export const listOf = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), total: z.number().int().min(0), next: z.string().nullable() });

/** Text a person types: trimmed, without control characters other than line breaks. */
export const text = (max: number, min = 1) =>
  z
    .string()
    .trim()
    .min(min)
    .max(max)
    .refine((s) => !/[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f]/.test(s), 'contains control characters');

/** The body of every error, RFC 9457. */
export const ProblemSchema = z
  .looseObject({
    type: z.string().describe('path of the problem type, as in /problems/fits-card'),
    title: z.string(),
    status: z.number().int(),
    detail: z.string().describe('what was found and what to do'),
    field: z.string().optional().describe('path of the offending field in the request'),
    card: z.string().optional().describe('the FITS card at fault'),
  })
  .meta({ id: 'Problem', description: 'application/problem+json, RFC 9457' });
