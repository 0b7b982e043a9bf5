import { readFile } from 'node:fs/promises';
import type { z } from 'zod';
import { PixelMarksFile, SkyMarksFile } from '@/shared/contract/marksFile';
import { isProblem, Problem } from '@/shared/contract/problem';
import { fitShell, type FitOptions } from '@/shared/shell/fit';
import type { FitInput } from '@/shared/shell/fitInput';
import { buildWcs } from '@/shared/sky/wcs';
import { openDiskSource } from '@/server/files/byteSource';
import { readCubeHead } from '@/server/files/cubeHead';

const USAGE =
  'npm run fit -- [cube.fits] marks.json [--model sphere|cap|drifting|elliptical] [--bootstrap n] [--seed n]';

interface Request {
  cube: string | null;
  marks: string;
  options: FitOptions;
}

/** Fit the marks of a file, with or without the cube they were made on, and print the fit as one JSON object. */
async function main(args: string[]): Promise<void> {
  const { cube, marks, options } = parse(args);
  const json = await readJson(marks);
  const { input, channelOf } =
    cube === null
      ? { input: check(SkyMarksFile, json, marks), channelOf: () => null }
      : await onCube(cube, json, marks);
  const { model, rings, ...rest } = fitShell(input, options);
  const numbered = rings.map((ring) => ({ channel: channelOf(ring.velocity), ...ring }));
  const fit = { model, status: 'done', ...rest, rings: numbered };
  process.stdout.write(`${JSON.stringify(fit, null, 2)}\n`);
}

interface Placed {
  input: FitInput;
  channelOf: (velocity: number) => number | null;
}

/** Marks in pixels and channels as places and velocities, through the cube's own coordinates. */
async function onCube(file: string, json: unknown, marksFile: string): Promise<Placed> {
  const { marks, channelWidth, vSys } = check(PixelMarksFile, json, marksFile);
  const source = await openDiskSource(file).catch((error: Error) => {
    throw new Problem('invalid-input', `${file} cannot be opened: ${error.message}.`, { field: 'cube' });
  });
  try {
    const head = await readCubeHead(source);
    const wcs = buildWcs(head.wcs);
    const placed = marks.map(({ channel, x, y, sigma }, i) => {
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
      return { ...place, velocity: wcs.velocityOf(channel), ...(sigma === undefined ? {} : { sigma }) };
    });
    return {
      input: { marks: placed, channelWidth: channelWidth ?? wcs.velocityStep, vSys },
      channelOf: (velocity) => Math.round(wcs.channelOf(velocity)),
    };
  } finally {
    await source.close();
  }
}

async function readJson(file: string): Promise<unknown> {
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

function parse(args: string[]): Request {
  const files: string[] = [];
  const options: FitOptions = {};
  for (let i = 0; i < args.length; i++) {
    const arg = args[i]!;
    if (!arg.startsWith('--')) {
      files.push(arg);
      continue;
    }
    const equals = arg.indexOf('=');
    const name = equals < 0 ? arg : arg.slice(0, equals);
    const value = equals < 0 ? args[++i] : arg.slice(equals + 1);
    if (value === undefined) throw wrong(name, `${name} needs a value`);
    if (name === '--model') options.model = value as FitOptions['model'];
    else if (name === '--bootstrap') options.bootstrap = whole(name, value);
    else if (name === '--seed') options.seed = whole(name, value);
    else throw wrong(name, `${name} is not understood`);
  }
  if (files.length < 1 || files.length > 2)
    throw wrong('marks', files.length === 0 ? 'No marks file is named' : 'Too many files are named');
  const [first, second] = files as [string, string?];
  return second === undefined
    ? { cube: null, marks: first, options }
    : { cube: first, marks: second, options };
}

function whole(name: string, text: string): number {
  if (!/^\d+$/.test(text)) throw wrong(name, `${name} needs a whole number, not "${text}"`);
  return Number(text);
}

const wrong = (field: string, what: string) =>
  new Problem('invalid-input', `${what}. Usage: ${USAGE}`, { field: field.replace(/^--/, '') });

main(process.argv.slice(2)).catch((error: unknown) => {
  const problem = isProblem(error)
    ? error
    : new Problem('internal', String((error as Error)?.message ?? error));
  process.stderr.write(`${JSON.stringify(problem)}\n`);
  process.exitCode = isProblem(error) && error.status < 500 ? 2 : 1;
});
