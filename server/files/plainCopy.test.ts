import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gunzipSync, gzipSync } from 'node:zlib';
import { isProblem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import { openDiskSource, type ByteSource } from './byteSource';
import { readCubeHead } from './cubeHead';
import { needsPlainCopy, writePlainFile, type PlainCopyOptions } from './plainCopy';

/** Made by fpack of cfitsio 4.2.0 (Debian libcfitsio-bin); beside each what its funpack makes of it. */
const folder = join(__dirname, '../../tests/reference/fits-corpus-compressed');
const work = mkdtempSync(join(tmpdir(), 'plain-copy-'));
afterAll(() => rmSync(work, { recursive: true }));

const making = join(work, 'making');

/** Plain copy of a file, as bytes with its head. */
async function copyOf(path: string, options: PlainCopyOptions = {}) {
  const source = await openDiskSource(path);
  const to = join(making, 'plain.fits');
  try {
    await writePlainFile(source, to, options);
    const bytes = readFileSync(to);
    return { bytes, head: await readCubeHead(sourceOf(bytes)) };
  } finally {
    await source.close();
    rmSync(to, { force: true });
  }
}
const sourceOf = (bytes: Uint8Array): ByteSource => ({
  size: bytes.length,
  read: async (offset, length) => bytes.subarray(offset, offset + length),
  close: async () => undefined,
});
async function headOf(path: string): Promise<CubeHead> {
  const source = await openDiskSource(path);
  return readCubeHead(source).finally(() => source.close());
}
const pixelsOf = (bytes: Uint8Array, { dataOffset, dataBytes }: CubeHead) =>
  Buffer.from(bytes.subarray(dataOffset, dataOffset + dataBytes));
const refusal = async (act: Promise<unknown>) => {
  const failure = await act.then(
    () => null,
    (error: unknown) => error,
  );
  if (!isProblem(failure)) throw new Error(`no problem: ${String(failure)}`);
  return failure;
};
const fileOf = (name: string, bytes: Uint8Array) => {
  const path = join(work, name);
  writeFileSync(path, bytes);
  return path;
};

const names = readdirSync(folder).filter((n) => /\.fits(\.gz)?$/.test(n) && !n.includes('funpack'));
const readable = names.filter((n) => !/^(hcompress|plio)/.test(n));

it('has files to read', () => expect(readable.length).toBeGreaterThan(12));

describe.each(readable)('%s', (name) => {
  it('has the pixels that funpack gives, bit for bit', async () => {
    const { bytes, head } = await copyOf(join(folder, name));
    const reference = gunzipSync(readFileSync(join(folder, name.replace(/\.fits.*/, '.funpack.fits.gz'))));
    const wanted = await readCubeHead(sourceOf(reference));
    expect(head).toMatchObject({ shape: wanted.shape, bitpix: wanted.bitpix, blank: wanted.blank });
    expect(sameNumbers(pixelsOf(bytes, head), pixelsOf(reference, wanted), head.bitpix)).toBe(true);
    expect(bytes.length % 2880).toBe(0);
  });

  it('is described before as after', async () => {
    const before = await headOf(join(folder, name));
    const { head } = await copyOf(join(folder, name));
    expect(needsPlainCopy(before)).toBe(true);
    expect(needsPlainCopy(head)).toBe(false);
    const { shape, bitpix, wcs, spectral, unit, object, cautions, layout, blank } = before;
    expect(head).toMatchObject({ shape, bitpix, wcs, spectral, unit, object, cautions, layout, blank });
  });
});

/** The same bits, but for NaNs, of which there are many. */
function sameNumbers(a: Buffer, b: Buffer, bitpix: number): boolean {
  if (bitpix > 0) return a.equals(b);
  const read = bitpix === -32 ? 'readFloatBE' : 'readDoubleBE';
  const size = -bitpix / 8;
  for (let at = 0; at < b.length; at += size) if (!Object.is(a[read](at), b[read](at))) return false;
  return a.length === b.length;
}

it.each(names.filter((n) => !readable.includes(n)))('refuses %s and says what to do', async (name) => {
  const failure = await refusal(headOf(join(folder, name)));
  expect(failure).toMatchObject({ type: 'fits-shape', extra: { card: 'ZCMPTYPE' } });
  expect(failure.detail).toMatch(/funpack/);
});

const CUBE = [
  ...['BITPIX  = 16', 'NAXIS   = 3', 'NAXIS1  = 4', 'NAXIS2  = 3', 'NAXIS3  = 2'],
  ...[
    "CTYPE1  = 'GLON-CAR'",
    "CTYPE2  = 'GLAT-CAR'",
    "CTYPE3  = 'VRAD'",
    'CDELT3  = 1000.0',
    "BUNIT   = 'K'",
  ],
];
const hdu = (first: string, ...more: string[]) =>
  Buffer.concat([headerBytesOf([first, ...CUBE, ...more]), Buffer.alloc(2880, 3)]);
const empty = headerBytesOf(['SIMPLE  = T', 'BITPIX  = 8', 'NAXIS   = 0']);
const cube = hdu('SIMPLE  =                    T');
const extension = hdu("XTENSION= 'IMAGE'", 'PCOUNT  = 0', 'GCOUNT  = 1', "EXTNAME = 'second'");

describe('gzip', () => {
  it('of several members is one file', async () => {
    const members = [cube.subarray(0, 1000), cube.subarray(1000, 3000), cube.subarray(3000)];
    const path = fileOf('members.fits.gz', Buffer.concat(members.map((m) => gzipSync(m))));
    expect(await headOf(path)).toMatchObject({ container: 'gzip', dataOffset: 2880 });
    const { bytes, head } = await copyOf(path);
    expect(pixelsOf(bytes, head).equals(pixelsOf(cube, head))).toBe(true);
  });

  it('gives the chosen HDU, as a primary image', async () => {
    const path = fileOf('two.fits.gz', gzipSync(Buffer.concat([empty, extension, extension])));
    const before = await headOf(path);
    expect(before.choices!.hdus).toEqual(
      [1, 2].map((index) => ({ index, name: 'second', shape: [4, 3, 2], usable: true })),
    );
    expect(before.cautions.join()).toMatch(/HDU 1 is read, HDU 2 is not/);
    const { bytes, head } = await copyOf(path, { hdu: 2 });
    expect(head).toMatchObject({ hdu: 0, container: 'plain', shape: { nx: 4, ny: 3, channels: 2 } });
    expect(bytes.toString('latin1', 0, 30)).toBe('SIMPLE  =                    T');
  });

  it('reports progress, and stops when told to', async () => {
    const path = fileOf('one.fits.gz', gzipSync(cube));
    const seen: number[] = [];
    await copyOf(path, { onProgress: (f) => seen.push(f) });
    expect(seen.at(-1)).toBe(1);
    await expect(copyOf(path, { signal: AbortSignal.abort(new Error('enough')) })).rejects.toThrow('enough');
  });

  const huge = headerBytesOf(['SIMPLE  = T', ...CUBE.map((c) => c.replace('= 4', '= 400000000'))]);
  const crc = gzipSync(cube);
  crc.writeUInt8(crc.readUInt8(crc.length - 6) ^ 1, crc.length - 6);
  it.each([
    ['a stream cut short', gzipSync(cube).subarray(0, -12), 'compressed-damaged', /ends early/],
    ['a wrong checksum', crc, 'compressed-damaged', /checksum/],
    ['data cut short inside', gzipSync(cube.subarray(0, 2880 + 40)), 'fits-truncated', /8 bytes too early/],
    ['a header cut short inside', gzipSync(cube.subarray(0, 1000)), 'fits-truncated', /no END/],
    ['something else', gzipSync(Buffer.from('<html><body>no cube</body></html>')), 'not-fits', /web page/],
    ['gzip in gzip', gzipSync(gzipSync(cube)), 'not-fits', /gzip/],
    [
      'a header that claims too much',
      gzipSync(Buffer.concat([huge, Buffer.alloc(1e6)])),
      'fits-truncated',
      /cannot hold/,
    ],
    ['no cube', gzipSync(empty), 'fits-shape', /no image/],
    [
      'endless zeros',
      gzipSync(Buffer.concat([cube, Buffer.alloc(40e6)])),
      'too-large',
      /after its FITS data/,
    ],
    ['no bytes behind the magic', Buffer.from([0x1f, 0x8b]), 'compressed-damaged', /ends early/],
  ] as const)(
    'refuses %s, and leaves nothing beside the file it was writing',
    async (_what, bytes, type, words) => {
      const path = fileOf('bad.fits.gz', bytes);
      for (const act of [() => headOf(path), () => copyOf(path)]) {
        const failure = await refusal(act());
        expect(failure.type).toBe(type);
        expect(failure.detail).toMatch(words);
      }
      expect(readdirSync(making)).toEqual([]);
    },
  );

  it('stops at the limit of the installation', async () => {
    const path = fileOf('limit.fits.gz', gzipSync(cube));
    expect(await refusal(copyOf(path, { maxBytes: 2900 }))).toMatchObject({ type: 'too-large' });
    expect(await refusal(copyOf(path, { maxBytes: 5000 }))).toMatchObject({ type: 'too-large' });
  });
});

describe('a damaged tile-compressed image', () => {
  const good = readFileSync(join(folder, 'rice-int16.fits'));
  const text = good.toString('latin1');
  const tableAt = 2880 * (1 + Math.ceil((text.indexOf('END   ', 2880) + 80 - 2880) / 2880));
  const damaged = (change: (bytes: Buffer) => void) => {
    const bytes = Buffer.from(good);
    change(bytes);
    return fileOf('damaged.fits', bytes);
  };
  it.each([
    ['whose row points outside', (b: Buffer) => b.writeInt32BE(1e9, tableAt + 4), /Row 1 .* outside/],
    ['whose row is negative', (b: Buffer) => b.writeInt32BE(-5, tableAt), /outside/],
    ['whose row is empty', (b: Buffer) => b.writeInt32BE(0, tableAt), /holds no pixels/],
    ['whose tile is short', (b: Buffer) => b.writeInt32BE(9, tableAt), /Tile 1 .* ends before/],
  ])('%s is refused, naming the place', async (_what, change, words) => {
    const failure = await refusal(copyOf(damaged(change)));
    expect(failure.type).toBe('compressed-damaged');
    expect(failure.detail).toMatch(words);
  });
});
