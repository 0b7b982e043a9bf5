import { z } from 'zod';

/** marks.json of the headless fit: rim marks on the sky, or, beside a cube, in its pixels and channels. */
const sigma = z.number().positive().optional().describe('position error, degrees');
const drawn = z
  .boolean()
  .optional()
  .describe('made by drawing a circle: its own marks do not scatter about it');

export const SkyMarkEntry = z.strictObject({
  l: z.number().describe('galactic longitude, degrees'),
  b: z.number().min(-90).max(90).describe('galactic latitude, degrees'),
  velocity: z.number().describe('km/s'),
  sigma,
  drawn,
});

export const PixelMarkEntry = z.strictObject({
  channel: z.number().int().min(0).describe('counted from 0'),
  x: z.number().describe('pixel, 0 at the centre of the first'),
  y: z.number(),
  sigma,
  drawn,
});

const vSys = z
  .strictObject({ value: z.number(), sigma: z.number().min(0).optional() })
  .optional()
  .describe('km/s; what is known of v_sys, for the cap model: held where sigma is 0 or absent');
const width = z.number().positive().describe('full width of a channel, km/s');

export const SkyMarksFile = z.looseObject({ channelWidth: width, marks: z.array(SkyMarkEntry), vSys });

/** The channel width is the cube's unless the file gives one. */
export const PixelMarksFile = z.looseObject({
  channelWidth: width.optional(),
  marks: z.array(PixelMarkEntry),
  vSys,
});

export type SkyMarksFile = z.infer<typeof SkyMarksFile>;
export type PixelMarksFile = z.infer<typeof PixelMarksFile>;
