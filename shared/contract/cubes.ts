import { z } from 'zod';
import { Id, ProblemSchema, Time } from './common';

export const CUBE_STATUS = ['uploaded', 'ingesting', 'ready', 'failed', 'cancelled'] as const;

/** The serialisable coordinate description; shared/sky rebuilds the transformation from it. */
const Wcs = z.looseObject({}).meta({ id: 'Wcs', description: 'input of the coordinate transformation' });

export const CubeAxes = z
  .object({
    nx: z.number().int(),
    ny: z.number().int(),
    channels: z.number().int(),
    bitpix: z.number().int(),
    unit: z.string().nullable(),
    frame: z.string().describe('frame of the sky axes: galactic, icrs, fk5, fk4 …'),
    projection: z.string().describe('three-letter code as the file writes it'),
    spectral: z.object({
      type: z.string(),
      convention: z.string().nullable(),
      frame: z.string().nullable(),
      restFrequencyHz: z.number().nullable(),
      velocities: z.tuple([z.number(), z.number()]).describe('km/s at the first and the last channel'),
      channelWidth: z.number().describe('km/s, positive'),
    }),
    beam: z
      .object({ major: z.number(), minor: z.number(), angle: z.number() })
      .nullable()
      .describe('degrees'),
    wcs: Wcs,
  })
  .meta({ id: 'CubeAxes' });

export const Cube = z
  .object({
    id: Id,
    regionId: Id,
    name: z.string(),
    fileName: z.string(),
    sizeBytes: z.number(),
    checksum: z.string().describe('SHA-256 of the file, hexadecimal'),
    status: z.enum(CUBE_STATUS),
    progress: z.number().min(0).max(1),
    activity: z.string().nullable().describe('what the worker is doing, in words'),
    problem: ProblemSchema.nullable().describe('why ingest failed'),
    axes: CubeAxes.nullable(),
    cautions: z.array(z.string()).describe('assumptions made in reading the header'),
    window: z.tuple([z.number(), z.number()]).nullable().describe('brightness window of the thumbnails'),
    statistics: z
      .object({
        minimum: z.number().nullable(),
        maximum: z.number().nullable(),
        rms: z.number().nullable(),
        blanks: z.number(),
      })
      .nullable(),
    createdBy: z.object({ id: Id, name: z.string() }).nullable(),
    createdAt: Time,
    readyAt: Time.nullable(),
  })
  .meta({ id: 'Cube' });

export const CubeChange = z
  .strictObject({ name: z.string().trim().min(1).max(120) })
  .meta({ id: 'CubeChange' });

export const Card = z
  .object({ keyword: z.string(), value: z.unknown(), comment: z.string().nullable() })
  .meta({ id: 'Card' });
export const CubeHeader = z
  .object({ cards: z.array(Card), cautions: z.array(z.string()) })
  .meta({ id: 'CubeHeader' });

export const Channel = z
  .object({
    channel: z.number().int(),
    velocity: z.number().describe('km/s'),
    minimum: z.number().nullable(),
    maximum: z.number().nullable(),
    mean: z.number().nullable(),
    rms: z
      .number()
      .nullable()
      .describe('1.4826 times the median absolute deviation: robust against the signal'),
    rmsAboutZero: z.number().nullable(),
    blanks: z.number().int().describe('pixels without a value'),
  })
  .meta({ id: 'Channel' });
export const ChannelList = z
  .object({ items: z.array(Channel), total: z.number().int(), next: z.null() })
  .meta({ id: 'ChannelList' });

export const SpectrumQuery = z.object({
  x: z.coerce.number().optional(),
  y: z.coerce.number().optional(),
  radius: z.coerce.number().min(0).max(64).default(0).describe('pixels'),
});
export const Spectrum = z
  .object({
    velocities: z.array(z.number()),
    brightness: z.array(z.number().nullable()),
    unit: z.string().nullable(),
    over: z.string().describe('what was averaged, in words'),
  })
  .meta({ id: 'Spectrum' });

export const PlaneQuery = z.object({
  size: z.coerce
    .number()
    .int()
    .min(16)
    .max(8192)
    .optional()
    .describe('longest side in pixels; reduced by block averages'),
});

/** Answer headers that go with the 16-bit numbers of a plane. */
export const PLANE_HEADERS = {
  width: 'Plane-Width',
  height: 'Plane-Height',
  scale: 'Plane-Scale',
  offset: 'Plane-Offset',
  blank: 'Plane-Blank',
  block: 'Plane-Block',
} as const;

export const UploadState = z
  .object({
    id: z.string(),
    regionId: Id,
    fileName: z.string(),
    sizeBytes: z.number(),
    receivedBytes: z.number(),
    status: z.enum(['receiving', 'checking', 'refused']),
    problem: ProblemSchema.nullable(),
    createdAt: Time,
    mine: z.boolean(),
  })
  .meta({ id: 'UploadState' });

export type CubeAxes = z.infer<typeof CubeAxes>;
export type Cube = z.infer<typeof Cube>;
export type Channel = z.infer<typeof Channel>;
export type Spectrum = z.infer<typeof Spectrum>;
export type CubeHeader = z.infer<typeof CubeHeader>;
export type UploadState = z.infer<typeof UploadState>;
