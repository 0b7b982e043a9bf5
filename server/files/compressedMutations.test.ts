import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gunzipSync, gzipSync } from 'node:zlib';
import fc from 'fast-check';
import { isProblem } from '@/shared/contract/problem';
import type { ByteSource } from './byteSource';
import { readCubeHead } from './cubeHead';
import { checkGzipBeginning } from './gzipBeginning';
import { isGzip } from './gunzip';
import { writePlainFile } from './plainCopy';

const folder = join(__dirname, '../../tests/reference/fits-corpus-compressed');
const work = mkdtempSync(join(tmpdir(), 'compressed-mutations-'));
afterAll(() => rmSync(work, { recursive: true }));

const read = (name: string) => readFileSync(join(folder, name));
const names = readdirSync(folder).filter((n) => /\.fits(\.gz)?$/.test(n) && !n.includes('funpack'));
/** Tile-compressed files as they are, and a cube in gzip. */
const good = new Map<string, Buffer>([
  ...names.map((n) => [n, n.endsWith('.gz') ? gunzipSync(read(n)) : read(n)] as const),
  ['gzip', read('rice-int16.funpack.fits.gz')],
  ['tiles in gzip', gzipSync(read('rice-int16.fits'))],
]);
const file = fc.constantFrom(...good.keys());
const RUNS = { numRuns: 400, interruptAfterTimeLimit: 8000, markInterruptAsFailure: false };

const sourceOf = (bytes: Uint8Array): ByteSource => ({
  size: bytes.length,
  read: async (offset, length) => bytes.subarray(offset, offset + length),
  close: async () => undefined,
});

/** Whether a plain copy came about; a problem is as good, anything else that is thrown fails the test. */
async function copied(bytes: Uint8Array): Promise<boolean> {
  const start = performance.now();
  const path = join(work, 'copy');
  try {
    const head = await readCubeHead(sourceOf(bytes));
    await writePlainFile(sourceOf(bytes), path, { maxBytes: 1e7 });
    const copy = readFileSync(path);
    const plain = await readCubeHead(sourceOf(copy));
    expect(plain).toMatchObject({ shape: head.shape, wcs: head.wcs, container: 'plain' });
    return true;
  } catch (error) {
    if (!isProblem(error)) throw error;
    expect(error.detail.length).toBeGreaterThan(10);
    return false;
  } finally {
    expect(performance.now() - start).toBeLessThan(2000);
    rmSync(path, { force: true });
  }
}

it('expands a compressed file with bytes flipped anywhere, or says why not', async () => {
  const flip = fc.tuple(fc.nat(2 ** 20), fc.integer({ min: 1, max: 255 }));
  await fc.assert(
    fc.asyncProperty(file, fc.array(flip, { minLength: 1, maxLength: 5 }), async (name, flips) => {
      const bytes = Buffer.from(good.get(name)!);
      for (const [at, bits] of flips) bytes[at % bytes.length]! ^= bits;
      await copied(bytes);
    }),
    RUNS,
  );
});

it('expands a compressed image with one card of its table changed, or says why not', async () => {
  const card = fc.constantFrom(
    ...'NAXIS1 NAXIS2 PCOUNT TFIELDS THEAP TFORM1 TTYPE1 ZIMAGE ZBITPIX ZNAXIS ZNAXIS1 ZNAXIS3 ZTILE1'.split(
      ' ',
    ),
    ...'ZTILE2 ZTILE3 ZCMPTYPE ZNAME1 ZVAL1 ZVAL2 ZQUANTIZ ZDITHER0 ZBLANK ZSCALE BLANK'.split(' '),
  );
  const value = fc.oneof(
    fc.integer().map(String),
    fc.integer({ min: -2, max: 40 }).map(String),
    fc.constantFrom(
      '1E300',
      "''",
      "'1QB'",
      "'1PI(9)'",
      "'1D'",
      "'GZIP_2'",
      "'RICE_1'",
      "'GZIP_1'",
      "'NOCOMPRESS'",
    ),
    fc.constantFrom(
      "'SUBTRACTIVE_DITHER_2'",
      "'NONE'",
      "'UNCOMPRESSED_DATA'",
      '99999999999',
      '-32',
      '16',
      '64',
    ),
  );
  await fc.assert(
    fc.asyncProperty(fc.constantFrom(...names), card, value, async (name, keyword, text) => {
      const bytes = Buffer.from(good.get(name)!);
      const found = bytes.indexOf(keyword.padEnd(8), 2880, 'latin1');
      const at = found > 0 && found % 80 === 0 ? found : bytes.indexOf('ZCMPTYPE', 2880);
      bytes.write(`${keyword.padEnd(8)}= ${text}`.padEnd(80), at, 'latin1');
      await copied(bytes);
    }),
    RUNS,
  );
});

it('refuses a gzip file cut off anywhere, and never refuses its beginning', async () => {
  const gzipped = fc.constantFrom(...[...good].filter(([, b]) => isGzip(b)).map(([name]) => name));
  await fc.assert(
    fc.asyncProperty(gzipped, fc.nat(2 ** 20), async (name, n) => {
      const bytes = good.get(name)!;
      const begun = bytes.subarray(0, 2 + (n % (bytes.length - 2)));
      expect(await copied(begun)).toBe(false);
      const judged = await checkGzipBeginning(begun, bytes.length, 1e9);
      if (judged) expect(judged.shape).toEqual({ nx: 21, ny: 16, channels: 5 });
    }),
    { ...RUNS, numRuns: 200 },
  );
});

it('reads an image one of whose compression parameters has no name, with the usual value', async () => {
  const name = [...good.keys()].find((n) => n.startsWith('rice-int32'))!;
  const bytes = Buffer.from(good.get(name)!);
  const at = bytes.indexOf('ZNAME1', 2880, 'latin1');
  expect(at % 80).toBe(0);
  bytes.write("ZNAME1  = ''".padEnd(80), at, 'latin1');
  expect(typeof (await copied(bytes))).toBe('boolean'); // and nothing is thrown that is no problem
});
