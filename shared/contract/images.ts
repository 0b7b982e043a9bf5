import { z } from 'zod';
import { Id, Time } from './common';

/** Most bytes of an image as it is sent, and of one that is compressed when expanded; most pixels of either. */
export const MAX_IMAGE_BYTES = 64 * 2 ** 20;
export const MAX_EXPANDED_IMAGE_BYTES = 256 * 2 ** 20;
export const MAX_IMAGE_PIXELS = 2 ** 25;

/** What the body of an added image may be called: the file itself, as it is. */
export const IMAGE_TYPES = [
  'application/fits',
  'image/fits',
  'application/octet-stream',
  'application/gzip',
  'application/x-gzip',
] as const;

export const ImageQuery = z.object({
  fileName: z.string().max(400).optional().describe('what the file is called, to show'),
});

/** A companion image: one of the same sky, added to a region to be laid over its cubes. */
export const SkyImage = z
  .object({
    id: Id,
    regionId: Id,
    name: z.string(),
    fileName: z.string(),
    sizeBytes: z.number(),
    checksum: z.string().describe('SHA-256 of the file, hexadecimal'),
    nx: z.number().int(),
    ny: z.number().int(),
    bitpix: z.number().int(),
    hdu: z.number().int().describe('which HDU of the file is read, from 0'),
    unit: z.string().nullable().describe('BUNIT as the file writes it'),
    object: z.string().nullable(),
    frame: z.string().describe('frame of the sky axes: galactic, icrs, fk5, fk4 …'),
    projection: z.string().describe('three-letter code as the file writes it'),
    sky: z.looseObject({}).meta({ id: 'Sky', description: 'input of the coordinate transformation' }),
    cautions: z.array(z.string()).describe('assumptions made in reading the header'),
    createdBy: z.object({ id: Id, name: z.string() }).nullable(),
    createdAt: Time,
  })
  .meta({ id: 'SkyImage' });

export const ImageChange = z
  .strictObject({ name: z.string().trim().min(1).max(120) })
  .meta({ id: 'ImageChange' });

export type SkyImage = z.infer<typeof SkyImage>;
