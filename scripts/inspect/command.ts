import { stat } from 'node:fs/promises';
import { Problem } from '@/shared/contract/problem';
import { planeStatistics } from '@/shared/fits/statistics';
import { buildWcs, type Wcs } from '@/shared/sky/wcs';
import { openDiskSource, type ByteSource } from '@/server/files/byteSource';
import { openPlain, type PlainSource } from '@/server/files/plainSource';
import { readPixel, readPlanes } from '@/server/files/planes';

const USAGE =
  'npm run inspect -- file.fits [--hdu n] [--stokes n] [--at=x,y,channel]... [--from=l,b,velocity]... [--stats]';

type Pixels = PlainSource['pixels'];

interface Options {
  file: string;
  hdu?: number;
  stokes?: number;
  at: number[][];
  from: number[][];
  stats: boolean;
}

/**
 * What a cube's header says, and what stands at the asked places.
 *
 * @returns one JSON object
 * @throws Problem what the input is at fault with
 */
export async function inspectCommand(args: readonly string[]): Promise<string> {
  const options = parse(args);
  const source = await open(options.file);
  try {
    const plain = await openPlain(source, { hdu: options.hdu, stokes: options.stokes });
    const seen = await inspect(plain, options).finally(() => plain.close());
    return JSON.stringify(seen, null, 2);
  } finally {
    await source.close();
  }
}

async function inspect({ head, pixels }: PlainSource, options: Options) {
  const wcs = buildWcs(head.wcs);
  const { type, convention, frame, restFrequencyHz, velocities } = head.spectral;
  const cautions = [...head.cautions];
  const stats = options.stats ? await statisticsOf(pixels, cautions) : [];
  if (!options.stats) await requireNumbers(pixels);
  const at = [];
  for (const [x, y, channel] of options.at) at.push(await placeAt(pixels, wcs, x!, y!, channel!));
  return {
    shape: head.shape,
    bitpix: head.bitpix,
    unit: head.unit,
    frame: head.frame,
    projection: head.projection,
    spectral: { type, convention, frame, restFrequencyHz, velocities },
    beam: head.beam,
    cautions,
    at,
    from: options.from.map(([l, b, velocity]) => placeFrom(wcs, l!, b!, velocity!)),
    stats,
  };
}

async function placeAt(pixels: Pixels, wcs: Wcs, x: number, y: number, channel: number) {
  const sky = wcs.pixelToSky(x, y);
  const galactic = wcs.pixelToGalactic(x, y);
  return {
    x,
    y,
    channel,
    lon: sky?.lon ?? null,
    lat: sky?.lat ?? null,
    l: galactic?.l ?? null,
    b: galactic?.b ?? null,
    velocity: wcs.velocityOf(channel),
    frequencyHz: wcs.frequencyHzOf(channel),
    value: await valueNear(pixels, x, y, channel),
  };
}

/** Brightness of the pixel that holds the place; null outside the cube and at a blank. */
async function valueNear({ source, head }: Pixels, x: number, y: number, channel: number) {
  const { nx, ny, channels } = head.shape;
  const [i, j, k] = [Math.round(x), Math.round(y), Math.round(channel)];
  const inside = i >= 0 && j >= 0 && k >= 0 && i < nx && j < ny && k < channels;
  return inside ? readPixel(source, head, i, j, k) : null;
}

function placeFrom(wcs: Wcs, l: number, b: number, velocity: number) {
  const pixel = wcs.galacticToPixel(l, b);
  const channel = wcs.channelOf(velocity);
  return {
    l,
    b,
    velocity,
    x: pixel?.x ?? null,
    y: pixel?.y ?? null,
    channel: Number.isFinite(channel) ? channel : null,
  };
}

async function statisticsOf({ source, head }: Pixels, cautions: string[]) {
  const scratch = new Float64Array(head.shape.nx * head.shape.ny);
  const stats = [];
  let infinite = 0;
  for await (const plane of readPlanes(source, head, { precise: true })) {
    stats.push({ channel: plane.channel, ...planeStatistics(plane.values, scratch) });
    infinite += plane.infinite;
  }
  if (stats.every((s) => s.min === null)) throw allBlank();
  if (infinite > 0) cautions.push(`${infinite} infinite values are counted as blank.`);
  return stats;
}

/** Refuse a cube without a single number; one plane is enough to tell for most cubes. */
async function requireNumbers({ source, head }: Pixels): Promise<void> {
  for await (const plane of readPlanes(source, head)) {
    if (plane.values.some((v) => !Number.isNaN(v))) return;
  }
  throw allBlank();
}

const allBlank = () =>
  new Problem('fits-shape', 'Every pixel of the cube is blank: there is nothing to measure.');

async function open(file: string): Promise<ByteSource> {
  try {
    if ((await stat(file)).isDirectory()) throw new Error('it is a folder');
    return await openDiskSource(file);
  } catch (error) {
    throw new Problem('invalid-input', `${file} cannot be opened: ${(error as Error).message}.`, {
      field: 'file',
    });
  }
}

function parse(args: readonly string[]): Options {
  const options: Options = { file: '', at: [], from: [], stats: false };
  for (let i = 0; i < args.length; i++) {
    const [name, joined] = split(args[i]!);
    const value = () => joined ?? args[++i] ?? '';
    if (name === '--stats') options.stats = true;
    else if (name === '--at') options.at.push(numbers(name, value(), 3));
    else if (name === '--from') options.from.push(numbers(name, value(), 3));
    else if (name === '--hdu') options.hdu = numbers(name, value(), 1)[0]!;
    else if (name === '--stokes') options.stokes = numbers(name, value(), 1)[0]!;
    else if (name.startsWith('--') || options.file !== '') throw wrong(`${args[i]} is not understood`);
    else options.file = args[i]!;
  }
  if (options.file === '') throw wrong('No file is named');
  return options;
}

function split(arg: string): [name: string, value: string | undefined] {
  const equals = arg.startsWith('--') ? arg.indexOf('=') : -1;
  return equals < 0 ? [arg, undefined] : [arg.slice(0, equals), arg.slice(equals + 1)];
}

function numbers(name: string, text: string, count: number): number[] {
  const parts = text.split(',').map((p) => (p.trim() === '' ? NaN : Number(p)));
  if (parts.length !== count || parts.some((p) => !Number.isFinite(p))) {
    throw wrong(`${name} needs ${count === 1 ? 'a number' : `${count} numbers with commas`}, not "${text}"`);
  }
  return parts;
}

const wrong = (what: string) => new Problem('invalid-input', `${what}. Usage: ${USAGE}`);
