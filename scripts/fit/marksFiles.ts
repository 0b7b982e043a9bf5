import { readFile } from 'node:fs/promises';
import type { z } from 'zod';
import { PixelMarksFile, SkyMarksFile } from '@/shared/contract/marksFile';
import { Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import type { FitInput } from '@/shared/shell/fitInput';
import { buildWcs } from '@/shared/sky/wcs';

/** Marks as the fit takes them, and the cube's channel at a velocity; null where there is no cube. */
export interface Placed {
  input: FitInput;
  channelOf: (velocity: number) => number | null;
}

/** Marks given as places on the sky and velocities. */
export function marksOnSky(json: unknown, file: string): Placed {
  return { input: check(SkyMarksFile, json, file), channelOf: () => null };
}

/** Marks in pixels and channels as places and velocities, through the cube's own coordinates. */
export function marksOnCube(head: CubeHead, json: unknown, file: string): Placed {
  const { marks, channelWidth, vSys } = check(PixelMarksFile, json, file);
  const wcs = buildWcs(head.wcs);
  const placed = marks.map(({ channel, x, y, ...said }, i) => {
    if (channel >= head.shape.channels)
      throw new Problem(
        'invalid-input',
        `Mark ${i} is on channel ${channel}; the cube has channels 0 to ${head.shape.channels - 1}.`,
        { field: `marks.${i}.channel` },
      );
    const place = wcs.pixelToGalactic(x, y);
    if (place === null)
      throw new Problem('invalid-input', `Mark ${i} lies where this projection shows no sky. Remove it.`, {
        field: `marks.${i}`,
      });
    return { ...place, velocity: wcs.velocityOf(channel), ...said };
  });
  return {
    input: { marks: placed, channelWidth: channelWidth ?? wcs.velocityStep, vSys },
    channelOf: (velocity) => Math.round(wcs.channelOf(velocity)),
  };
}

export async function readJson(file: string): Promise<unknown> {
  let text: string;
  try {
    text = await readFile(file, 'utf8');
  } catch (error) {
    throw new Problem('invalid-input', `${file} cannot be read: ${(error as Error).message}.`, {
      field: 'marks',
    });
  }
  try {
    return JSON.parse(text);
  } catch (error) {
    const what = /\b-?(NaN|Infinity)\b/.test(text)
      ? 'JSON has no NaN and no Infinity: leave such marks out.'
      : 'Correct it where the message says.';
    throw new Problem('malformed-json', `${file} is not JSON: ${(error as Error).message}. ${what}`);
  }
}

/** The first thing wrong with a file, as the field and a sentence. */
function check<T>(schema: z.ZodType<T>, json: unknown, file: string): T {
  const parsed = schema.safeParse(json);
  if (parsed.success) return parsed.data;
  const [issue] = parsed.error.issues;
  const field = issue!.path.join('.') || 'marks';
  throw new Problem('invalid-input', `In ${file}, ${field}: ${issue!.message}.`, { field });
}
