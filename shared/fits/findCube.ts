import { Problem } from '@/shared/contract/problem';
import { axisLengths } from './cubeAxes';
import { describeCube, type CubeHead } from './cubeHead';
import { Header } from './header';
import { BLOCK, MAX_HEADER_BYTES, scanHeader } from './headerScan';

/** Reads length bytes from offset on; fewer only where the file ends. */
export type ReadBytes = (offset: number, length: number) => Promise<Uint8Array>;

/** First read of a header, and HDUs looked at before the search is given up. */
const FIRST_READ = 10 * BLOCK;
const MAX_HDUS = 1000;

interface Hdu {
  bytes: Uint8Array;
  /** Where the next HDU would begin. */
  end: number;
  hasImage: boolean;
}

/**
 * Find the first cube in a FITS file and describe it, reading headers only. Works over anything that can read bytes:
 * a file on disk, an object in a store, a file chosen in the browser.
 *
 * @param size bytes of the whole file
 * @param hdu  describe this HDU (from 0) instead of the first that is a cube
 * @throws Problem not-fits, fits-card, fits-shape, fits-truncated; of several HDUs without a cube, the first image's
 */
export async function findCube(read: ReadBytes, size: number, hdu?: number): Promise<CubeHead> {
  const { head, end } = await firstCube(read, size, hdu);
  const after = await cautionsAfter(read, end, size, head.hdu, hdu === undefined);
  return { ...head, cautions: [...head.cautions, ...after] };
}

/**
 * Judge a file by its first bytes, while the rest is still on its way.
 *
 * @param bytes what has arrived, from the start of the file
 * @param size  bytes the whole file will have
 * @returns the cube's head, or null while more bytes are needed to tell
 * @throws Problem as soon as the file cannot be read as a cube
 */
export async function checkBeginning(bytes: Uint8Array, size: number): Promise<CubeHead | null> {
  const read: ReadBytes = async (offset, length) => {
    if (offset >= bytes.length && offset < size) throw new MoreBytesNeeded();
    return bytes.subarray(offset, offset + length);
  };
  try {
    return (await firstCube(read, size)).head;
  } catch (error) {
    if (error instanceof MoreBytesNeeded) return null;
    throw error;
  }
}

/** The reader had fewer bytes than the file's size promises. */
class MoreBytesNeeded extends Problem {
  constructor() {
    super('fits-truncated', 'The file ends inside its header.', { card: 'END' });
  }
}

async function firstCube(
  read: ReadBytes,
  size: number,
  hdu?: number,
): Promise<{ head: CubeHead; end: number }> {
  if (size === 0) throw new Problem('not-fits', 'The file is empty.');
  let offset = 0;
  let refusal: Problem | null = null;
  let tables = 0;
  for (let n = 0; n < MAX_HDUS; n++) {
    const found = await readHdu(read, offset, size, n);
    if (found === null) break;
    if (hdu === undefined ? found.hasImage || n === 0 : n === hdu) {
      const head = tryDescribe(found, size, offset, n);
      if (!(head instanceof Problem)) return { head, end: found.end };
      if (hdu !== undefined || head.type !== 'fits-shape') throw head;
      if (found.hasImage || head.extra.card === 'GROUPS') refusal ??= head;
    }
    if (!found.hasImage && n > 0) tables++;
    offset = found.end;
  }
  if (hdu !== undefined) {
    throw new Problem('invalid-input', `The file has no HDU ${hdu} (they count from 0).`, { field: 'hdu' });
  }
  const what = tables > 0 ? 'a table' : 'a header';
  throw refusal ?? new Problem('fits-shape', `The file holds ${what} and no image.`, { card: 'NAXIS' });
}

function tryDescribe(found: Hdu, size: number, offset: number, n: number): CubeHead | Problem {
  try {
    return describeCube(found.bytes, size, offset, n);
  } catch (error) {
    if (error instanceof Problem) return error;
    throw error;
  }
}

/** The HDU at an offset; null where the file has ended, or goes on with something that is no extension. */
async function readHdu(read: ReadBytes, offset: number, size: number, n: number): Promise<Hdu | null> {
  if (offset >= size) return null;
  if (n > 0) {
    const start = await read(offset, 9);
    if (start.length < Math.min(9, size - offset)) throw new MoreBytesNeeded();
    if (!startsExtension(start)) return null;
  }
  const kind = n === 0 ? 'primary' : 'extension';
  for (let length = FIRST_READ; ; length *= 4) {
    const wanted = Math.min(length, size - offset, MAX_HEADER_BYTES + BLOCK);
    const bytes = await read(offset, wanted);
    const scan = scanHeader(bytes, kind);
    if (scan.status === 'complete') {
      const header = bytes.subarray(0, scan.headerBytes);
      return { bytes: header, ...extent(new Header(header), offset + scan.headerBytes) };
    }
    if (offset + bytes.length >= size) {
      throw new Problem('fits-truncated', 'The file ends inside its header: no END card was found.', {
        card: 'END',
      });
    }
    if (bytes.length < wanted) throw new MoreBytesNeeded();
  }
}

/** Size of the data of any HDU, images, tables and random groups alike (FITS Standard 4.0, equation 2). */
function extent(header: Header, dataStart: number): { end: number; hasImage: boolean } {
  const naxis = axisLengths(header);
  const groups = header.logical('GROUPS') === true && naxis[0] === 0;
  const pixels =
    naxis.length === 0 ? 0 : (groups ? naxis.slice(1) : naxis).reduce((product, n) => product * n, 1);
  const bytesPerPixel = Math.abs(header.integer('BITPIX') ?? 0) / 8;
  const heap = header.integer('PCOUNT') ?? 0;
  const count = header.integer('GCOUNT') ?? 1;
  const bytes = naxis.length === 0 ? 0 : bytesPerPixel * count * (heap + pixels);
  const isTable = header.has('XTENSION') && header.text('XTENSION') !== 'IMAGE';
  return {
    end: dataStart + Math.ceil(bytes / BLOCK) * BLOCK,
    hasImage: header.logical('ZIMAGE') === true || (!isTable && !groups && naxis.length > 0),
  };
}

/** What follows a cube: another cube, which is left alone, or bytes that are no FITS. */
async function cautionsAfter(
  read: ReadBytes,
  start: number,
  size: number,
  n: number,
  lookForMore: boolean,
): Promise<string[]> {
  let offset = start;
  for (let k = n + 1; k < MAX_HDUS && offset < size; k++) {
    const begin = await read(offset, BLOCK);
    if (!startsExtension(begin)) {
      return begin.every((b) => b === 0)
        ? []
        : [`${size - offset} bytes after the data are no FITS and are ignored.`];
    }
    let next: Hdu | null;
    try {
      next = await readHdu(read, offset, size, k);
    } catch {
      return [`What follows the cube (HDU ${k}) cannot be read and is ignored.`];
    }
    if (next === null) return [];
    if (lookForMore && next.hasImage && !(tryDescribe(next, size, offset, k) instanceof Problem)) {
      return [`The file holds more than one cube; HDU ${n} is read, HDU ${k} is not.`];
    }
    offset = next.end;
  }
  return [];
}

function startsExtension(bytes: Uint8Array): boolean {
  return String.fromCharCode(...bytes.subarray(0, 9)) === 'XTENSION=';
}
