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

/** What a person says of the cube where the header does not, or says it wrong; null takes it back. */
export const CubeOverrides = z
  .strictObject({
    unit: z.enum(['K', 'mK', 'Jy/beam', 'mJy/beam']).nullable().optional(),
    restFrequencyHz: z.number().positive().max(1e13).nullable().optional(),
    beam: z
      .strictObject({
        major: z.number().positive().max(90),
        minor: z.number().positive().max(90),
        angle: z.number(),
      })
      .nullable()
      .optional()
      .describe('degrees; angle from north through east'),
    convention: z.enum(['radio', 'optical', 'relativistic']).nullable().optional(),
    velocityFrame: z
      .enum(['LSRK', 'LSRD', 'BARYCENT', 'HELIOCEN', 'TOPOCENT', 'GEOCENTR', 'GALACTOC', 'LOCALGRP'])
      .nullable()
      .optional(),
  })
  .meta({ id: 'CubeOverrides' });

/** Which image of the file, and which plane along a Stokes axis, is the cube; choosing another reads it again. */
export const CubeSource = z
  .strictObject({
    hdu: z.number().int().min(0).max(10_000),
    stokes: z.number().int().min(0).max(1000).default(0),
  })
  .meta({ id: 'CubeSource' });

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
        rms: z.number().nullable().describe('noise of the cube, from channels without signal'),
        blanks: z.number(),
      })
      .nullable(),
    source: CubeSource.describe('what of the file is read'),
    choices: z
      .object({
        hdus: z.array(z.object({ index: z.number().int(), name: z.string(), usable: z.boolean() })),
        stokes: z.array(z.object({ index: z.number().int(), name: z.string() })),
      })
      .describe('what else of the file could be read; empty lists: nothing'),
    overrides: z
      .object({ values: CubeOverrides, by: z.object({ id: Id, name: z.string() }).nullable(), at: Time })
      .nullable(),
    overlaps: z
      .array(z.object({ id: Id, name: z.string() }))
      .describe('cubes of the region that show some of the same sky'),
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
    median: z.number().nullable(),
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
  radius: z.coerce.number().min(0).max(1024).default(0).describe('pixels'),
  inner: z.coerce
    .number()
    .min(0)
    .max(1024)
    .default(0)
    .describe('pixels; more than 0: a ring between inner and radius'),
  of: z
    .enum(['mean', 'median', 'maximum'])
    .default('mean')
    .describe('for the whole cube; a place gives the mean'),
});

/** Maps that ingest makes of all channels together. */
export const MAP_KINDS = ['total', 'velocity', 'dispersion', 'peak'] as const;
export type MapKind = (typeof MAP_KINDS)[number];

export const CutQuery = z
  .object({
    l: z.coerce.number().describe('degrees: where a segment begins, or the centre of a ring'),
    b: z.coerce.number(),
    toL: z.coerce.number().optional().describe('degrees: where the segment ends'),
    toB: z.coerce.number().optional(),
    radius: z.coerce
      .number()
      .positive()
      .max(90)
      .optional()
      .describe('degrees: a ring about l, b, from north through east'),
  })
  .describe('either toL and toB, or radius');

/** Answer headers of a cut beside those of a plane: degrees between neighbouring samples, and what was done between pixels. */
export const CUT_HEADERS = { step: 'Cut-Step', interpolation: 'Cut-Interpolation' } as const;

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
  bits: z
    .enum(['8', '16'])
    .default('16')
    .transform((bits) => (bits === '8' ? 8 : 16))
    .describe('of a number'),
});

/** Answer headers that go with the numbers of a plane; the mask with those of a map. */
export const PLANE_HEADERS = {
  width: 'Plane-Width',
  height: 'Plane-Height',
  scale: 'Plane-Scale',
  offset: 'Plane-Offset',
  blank: 'Plane-Blank',
  block: 'Plane-Block',
  mask: 'Plane-Mask',
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

export type CubeOverrides = z.infer<typeof CubeOverrides>;
export type CubeSource = z.infer<typeof CubeSource>;
export type CubeAxes = z.infer<typeof CubeAxes>;
export type Cube = z.infer<typeof Cube>;
export type Channel = z.infer<typeof Channel>;
export type Spectrum = z.infer<typeof Spectrum>;
export type CubeHeader = z.infer<typeof CubeHeader>;
export type UploadState = z.infer<typeof UploadState>;
