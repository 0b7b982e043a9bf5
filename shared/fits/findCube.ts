import { Problem } from '@/shared/contract/problem';
import { axisLengths } from './cubeAxes';
import { describeCube, type CubeHead, type HduChoice } from './cubeHead';
import { Header } from './header';
import { BLOCK, MAX_HEADER_BYTES, scanHeader } from './headerScan';

/** Reads length bytes from offset on; fewer only where the file ends. Offsets are asked for in rising order. */
export type ReadBytes = (offset: number, length: number) => Promise<Uint8Array>;

/** Bytes of a whole file; of a stream a function, which answers Infinity until a read has met the end. */
export type FileSize = number | (() => number);

/** Which part of a file is wanted: HDU (from 0; default the first that is a cube) and plane along a Stokes axis. */
export interface CubeChoice {
  hdu?: number;
  stokes?: number;
}

/** First read of a header, and HDUs looked at before the search is given up. */
const FIRST_READ = 10 * BLOCK;
const MAX_HDUS = 1000;

/** One HDU: its header as bytes, where it lies, and whether it holds an image. */
export interface Hdu {
  index: number;
  header: Uint8Array;
  start: number;
  /** Where the next HDU would begin. */
  end: number;
  hasImage: boolean;
  name: string;
  shape: number[];
}

export interface FoundCube {
  head: CubeHead;
  hdu: Hdu;
  /** Images before it, that were passed. */
  before: HduChoice[];
}

/**
 * Find the first cube in a FITS file (or the chosen one) and describe it, reading headers only. Works over anything
 * that can read bytes: a file on disk, an object in a store, a file chosen in the browser, an expanding stream.
 *
 * @param size bytes of the whole file
 * @returns the head, with the images of the file under `choices` and cautions about what follows the cube
 * @throws Problem not-fits, fits-card, fits-shape, fits-truncated; of several HDUs without a cube, the first image's
 */
export async function findCube(read: ReadBytes, size: FileSize, choice: CubeChoice = {}): Promise<CubeHead> {
  const found = await locateCube(read, size, choice);
  return (await withWhatFollows(found, read, size, choice.hdu === undefined)).head;
}

/** Where the HDUs that were looked at end, and the number of the next. */
export interface RestOfFile {
  start: number;
  index: number;
}

export const restAfter = ({ hdu }: FoundCube): RestOfFile => ({ start: hdu.end, index: hdu.index + 1 });

/** The head of a cube that was located, with the images and cautions of the rest of the file. */
export async function withWhatFollows(
  { head, hdu, before }: FoundCube,
  read: ReadBytes,
  size: FileSize,
  isFirst: boolean,
): Promise<{ head: CubeHead; rest: RestOfFile }> {
  const after = await lookBehind(read, hdu, size);
  const other = after.hdus.find((h) => h.usable);
  const cautions = [...head.cautions, ...after.cautions];
  if (isFirst && other)
    cautions.push(`The file holds more than one cube; HDU ${hdu.index} is read, HDU ${other.index} is not.`);
  const hdus = [...before, choiceOf(hdu, true), ...after.hdus];
  const choices = { hdus, stokes: head.choices?.stokes ?? [] };
  return { head: { ...head, cautions, choices }, rest: after.rest };
}

/**
 * Judge a file by its first bytes, while the rest is still on its way.
 *
 * @param bytes what has arrived, from the start of the file
 * @param size  bytes the whole file will have; Infinity when that is not known
 * @returns the cube's head, or null while more bytes are needed to tell
 * @throws Problem as soon as the file cannot be read as a cube
 */
export async function checkBeginning(bytes: Uint8Array, size: number): Promise<CubeHead | null> {
  const read: ReadBytes = async (offset, length) => bytes.subarray(offset, offset + length);
  try {
    return (await locateCube(read, size)).head;
  } catch (error) {
    if (error instanceof MoreBytesNeeded) return null;
    throw error;
  }
}

/** The reader had fewer bytes than the file's size promises. */
export class MoreBytesNeeded extends Problem {
  constructor() {
    super('fits-truncated', 'The file ends inside its header.', { card: 'END' });
  }
}

/**
 * Find the cube, and nothing of what follows it.
 *
 * @throws Problem as `findCube`
 */
export async function locateCube(
  read: ReadBytes,
  size: FileSize,
  { hdu, stokes }: CubeChoice = {},
): Promise<FoundCube> {
  if (size === 0) throw new Problem('not-fits', 'The file is empty.');
  const before: HduChoice[] = [];
  let offset = 0;
  let refusal: Problem | null = null;
  let tables = 0;
  for (let n = 0; n < MAX_HDUS; n++) {
    const found = await readHdu(read, offset, size, n);
    if (found === null) break;
    const isWanted = hdu === undefined ? found.hasImage || n === 0 : n === hdu;
    const head = isWanted || found.hasImage ? tryDescribe(found, size, isWanted ? stokes : undefined) : null;
    if (isWanted) {
      if (!(head instanceof Problem)) return { head: head!, hdu: found, before };
      if (hdu !== undefined || head.type !== 'fits-shape') throw head;
      if (found.hasImage || head.extra.card === 'GROUPS') refusal ??= head;
    }
    if (found.hasImage) before.push(choiceOf(found, !(head instanceof Problem)));
    else if (n > 0) tables++;
    offset = found.end;
  }
  if (hdu !== undefined) {
    throw new Problem('invalid-input', `The file has no HDU ${hdu} (they count from 0).`, { field: 'hdu' });
  }
  const what = tables > 0 ? 'a table' : 'a header';
  throw refusal ?? new Problem('fits-shape', `The file holds ${what} and no image.`, { card: 'NAXIS' });
}

function tryDescribe(found: Hdu, size: FileSize, stokes: number | undefined): CubeHead | Problem {
  try {
    const place = { offset: found.start, hdu: found.index, stokes };
    const bytes = now(size);
    return describeCube(found.header, Number.isFinite(bytes) ? bytes : undefined, place);
  } catch (error) {
    if (error instanceof Problem) return error;
    throw error;
  }
}

const now = (size: FileSize) => (typeof size === 'function' ? size() : size);

const choiceOf = ({ index, name, shape }: Hdu, usable: boolean): HduChoice => ({
  index,
  name,
  shape,
  usable,
});

/** The HDU at an offset; null where the file has ended, or goes on with something that is no extension. */
export async function readHdu(
  read: ReadBytes,
  offset: number,
  size: FileSize,
  n: number,
): Promise<Hdu | null> {
  if (offset >= now(size)) return null;
  if (n > 0) {
    const start = await read(offset, 9);
    if (start.length < Math.min(9, now(size) - offset)) throw new MoreBytesNeeded();
    if (!startsExtension(start)) return null;
  }
  const kind = n === 0 ? 'primary' : 'extension';
  for (let length = FIRST_READ; ; length *= 4) {
    const wanted = Math.min(length, now(size) - offset, MAX_HEADER_BYTES + BLOCK);
    const bytes = await read(offset, wanted);
    const scan = scanHeader(bytes, kind);
    if (scan.status === 'complete') {
      const header = bytes.slice(0, scan.headerBytes);
      return { index: n, header, start: offset, ...extent(new Header(header), offset + scan.headerBytes) };
    }
    if (offset + bytes.length >= now(size)) {
      throw new Problem('fits-truncated', 'The file ends inside its header: no END card was found.', {
        card: 'END',
      });
    }
    if (bytes.length < wanted) throw new MoreBytesNeeded();
  }
}

/** Size of the data of any HDU, images, tables and random groups alike (FITS Standard 4.0, equation 2). */
function extent(header: Header, dataStart: number): Pick<Hdu, 'end' | 'hasImage' | 'name' | 'shape'> {
  const naxis = axisLengths(header);
  const groups = header.logical('GROUPS') === true && naxis[0] === 0;
  const pixels =
    naxis.length === 0 ? 0 : (groups ? naxis.slice(1) : naxis).reduce((product, n) => product * n, 1);
  const bytesPerPixel = Math.abs(header.integer('BITPIX') ?? 0) / 8;
  const heap = header.integer('PCOUNT') ?? 0;
  const count = header.integer('GCOUNT') ?? 1;
  const bytes = naxis.length === 0 ? 0 : bytesPerPixel * count * (heap + pixels);
  const isTable = header.has('XTENSION') && header.text('XTENSION') !== 'IMAGE';
  const isTiled = header.logical('ZIMAGE') === true;
  return {
    end: dataStart + Math.max(0, Math.ceil(bytes / BLOCK) * BLOCK),
    hasImage: isTiled || (!isTable && !groups && naxis.length > 0),
    name: header.text('EXTNAME') ?? '',
    shape: isTiled && header.has('ZNAXIS') ? axisLengths(header, 'Z') : naxis,
  };
}

/** What follows a cube: other images, or bytes that are no FITS. */
async function lookBehind(
  read: ReadBytes,
  { end, index }: Hdu,
  size: FileSize,
): Promise<{ hdus: HduChoice[]; cautions: string[]; rest: RestOfFile }> {
  const hdus: HduChoice[] = [];
  const cautions: string[] = [];
  const rest = { start: end, index: index + 1 };
  for (; rest.index < MAX_HDUS && rest.start < now(size); rest.index++) {
    const begin = await read(rest.start, BLOCK);
    if (begin.length === 0) break;
    if (!startsExtension(begin)) {
      const bytes = now(size) - rest.start;
      if (begin.some((b) => b !== 0))
        cautions.push(
          `${Number.isFinite(bytes) ? `${bytes} bytes` : 'Bytes'} after the data are no FITS and are ignored.`,
        );
      break;
    }
    try {
      const next = await readHdu(read, rest.start, size, rest.index);
      if (next === null) break;
      if (next.hasImage) hdus.push(choiceOf(next, !(tryDescribe(next, size, undefined) instanceof Problem)));
      rest.start = next.end;
    } catch (error) {
      if (!(error instanceof Problem) || error.type === 'compressed-damaged') throw error;
      cautions.push(`What follows the cube (HDU ${rest.index}) cannot be read and is ignored.`);
      break;
    }
  }
  return { hdus, cautions, rest };
}

export function startsExtension(bytes: Uint8Array): boolean {
  return String.fromCharCode(...bytes.subarray(0, 9)) === 'XTENSION=';
}
