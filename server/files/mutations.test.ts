import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { isProblem, type Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { buildWcs } from '@/shared/sky/wcs';
import manifest from '@/tests/reference/fits-corpus/manifest.json';
import type { ByteSource } from './byteSource';
import { readCubeHead } from './cubeHead';
import { readPixel } from './planes';

const folder = join(__dirname, '../../tests/reference/fits-corpus');
const good = manifest.files
  .filter((f) => f.shape && f.file.endsWith('.fits') && f.file !== 'rice.fits')
  .map((f) => ({ ...f, bytes: readFileSync(join(folder, f.file)) }));
type Good = Omit<(typeof good)[number], 'bytes'> & { bytes: Buffer };

/** One case may take this long, however the header lies. */
const MOST_MS = 1000;
const RUNS = { numRuns: 700, interruptAfterTimeLimit: 9000, markInterruptAsFailure: false };

const sourceOf = (bytes: Uint8Array): ByteSource => ({
  size: bytes.length,
  read: async (offset, length) => bytes.subarray(offset, offset + length),
  close: async () => undefined,
});

interface Place {
  velocity: number;
  frequencyHz: number | null;
  sky: { lon: number; lat: number } | null;
  value: number | null;
}

/** Head and what stands at one pixel, or the problem; anything else that is thrown fails the test. */
async function reading(bytes: Uint8Array): Promise<{ head: CubeHead; places: Place[] } | Problem> {
  const source = sourceOf(bytes);
  try {
    const head = await readCubeHead(source);
    const wcs = buildWcs(head.wcs);
    const { nx, ny, channels } = head.shape;
    const places: Place[] = [];
    for (const [x, y, k] of [
      [0, 0, 0],
      [nx - 1, ny - 1, channels - 1],
      [nx >> 1, ny >> 1, channels >> 1],
    ] as const)
      places.push({
        velocity: wcs.velocityOf(k),
        frequencyHz: wcs.frequencyHzOf(k),
        sky: wcs.pixelToSky(x, y),
        value: await readPixel(source, head, x, y, k),
      });
    return { head, places };
  } catch (error) {
    if (isProblem(error)) return error;
    throw error;
  }
}

/** Read twice: a head with numbers or a problem with a sentence, in little time, the same both times. */
async function judged(bytes: Uint8Array) {
  const start = performance.now();
  const first = await reading(bytes);
  expect(performance.now() - start).toBeLessThan(MOST_MS);
  const again = await reading(bytes.slice());
  if (isProblem(first)) {
    expect(first.status).toBe(422);
    expect(first.detail.length).toBeGreaterThan(10);
    expect(isProblem(again) && again.detail).toBe(first.detail);
    return first;
  }
  expect(again).toEqual(first);
  expect(JSON.parse(JSON.stringify(first.head))).toEqual(first.head);
  for (const { velocity, frequencyHz, sky, value } of first.places) {
    expectFinite(velocity);
    for (const n of [frequencyHz, sky?.lon ?? null, sky?.lat ?? null, value]) if (n !== null) expectFinite(n);
  }
  return first;
}

const expectFinite = (n: number) => expect({ n, finite: Number.isFinite(n) }).toEqual({ n, finite: true });

const byName = new Map(good.map((f) => [f.file, f]));
const file = fc.constantFrom(...byName.keys());
const named = (name: string): Good => byName.get(name)!;
const headerStart = (f: Good) => (f.hdu === 0 ? 0 : 2880);
const cardCount = (f: Good) => {
  const text = f.bytes.toString('latin1', headerStart(f));
  return Math.floor(text.search(/END {77}/) / 80);
};
const withCard = (f: Good, index: number, change: (card: string) => string): Buffer => {
  const bytes = Buffer.from(f.bytes);
  const at = headerStart(f) + 80 * (index % cardCount(f));
  const card = change(bytes.toString('latin1', at, at + 80));
  bytes.write(card.padEnd(80).slice(0, 80), at, 'latin1');
  return bytes;
};
const value = fc.oneof(
  fc.constantFrom(
    '0',
    '-1',
    '1',
    '1E400',
    '-1E308',
    '1E-320',
    'NaN',
    'T',
    "''",
    "'x",
    '',
    '1.5',
    '99999999999999999999',
  ),
  fc.double({ noNaN: true }).map(String),
  fc.integer().map(String),
  fc.string({ maxLength: 20 }).map((s) => `'${s}'`),
  fc.constantFrom(
    "'GLON-TAN'",
    "'GLAT-CAR'",
    "'RA---SIN'",
    "'FREQ'",
    "'VOPT-F2W'",
    "'STOKES'",
    "'km/s'",
    "'deg'",
  ),
);
const keyword = fc.constantFrom(
  ...'BITPIX NAXIS NAXIS1 NAXIS3 CTYPE1 CTYPE3 CRVAL1 CRVAL2 CRVAL3 CDELT1 CDELT3 CRPIX1 CUNIT1 CUNIT3'.split(
    ' ',
  ),
  ...'LONPOLE LATPOLE PV2_1 PV1_3 PC1_2 CD1_1 CROTA2 RESTFRQ EQUINOX RADESYS BSCALE BZERO BLANK BMAJ'.split(
    ' ',
  ),
  ...'PCOUNT GCOUNT GROUPS ZIMAGE VELREF SPECSYS XTENSION SIMPLE END CONTINUE ZBITPIX BUNIT'.split(' '),
);

it('reads a header with one value changed, or says why not', async () => {
  await fc.assert(
    fc.asyncProperty(file, fc.nat(200), value, async (name, i, v) => {
      await judged(withCard(named(name), i, (card) => `${card.slice(0, 10)}${v}`));
    }),
    RUNS,
  );
});

it('reads a header with a card put in, or says why not', async () => {
  await fc.assert(
    fc.asyncProperty(file, fc.nat(200), keyword, value, async (name, i, k, v) => {
      await judged(withCard(named(name), i, () => `${k.padEnd(8)}= ${v}`));
    }),
    RUNS,
  );
});

it('reads a header with cards dropped, doubled or swapped, or says why not', async () => {
  const how = fc.constantFrom('drop', 'double', 'swap');
  await fc.assert(
    fc.asyncProperty(file, fc.nat(200), fc.nat(200), how, async (name, i, j, change) => {
      const f = named(name);
      const cardAt = (n: number) => {
        const at = headerStart(f) + 80 * (n % cardCount(f));
        return f.bytes.toString('latin1', at, at + 80);
      };
      const once = withCard(f, i, () => (change === 'drop' ? '' : cardAt(j)));
      await judged(change === 'swap' ? withCard({ ...f, bytes: once }, j, () => cardAt(i)) : once);
    }),
    RUNS,
  );
});

it('reads a file with bytes flipped anywhere, or says why not', async () => {
  const flip = fc.tuple(fc.nat(2 ** 20), fc.integer({ min: 1, max: 255 }));
  await fc.assert(
    fc.asyncProperty(file, fc.array(flip, { minLength: 1, maxLength: 6 }), async (name, flips) => {
      const bytes = Buffer.from(named(name).bytes);
      for (const [at, bits] of flips) bytes[at % bytes.length]! ^= bits;
      await judged(bytes);
    }),
    RUNS,
  );
});

it('refuses a file cut off before the end of its data', async () => {
  await fc.assert(
    fc.asyncProperty(file, fc.nat(2 ** 20), async (name, at) => {
      const f = named(name);
      const whole = await readCubeHead(sourceOf(f.bytes));
      const needed = whole.dataOffset + whole.dataBytes;
      const outcome = await judged(f.bytes.subarray(0, at % needed));
      expect(isProblem(outcome) && outcome.type).toMatch(/^(fits-truncated|not-fits|fits-shape)$/);
    }),
    RUNS,
  );
});

it('reads the same numbers when cards change that have nothing to do with them', async () => {
  const comment = fc.string({ maxLength: 60 }).map((s) => s.replace(/[^ -~]/g, '?'));
  await fc.assert(
    fc.asyncProperty(file, fc.nat(200), comment, async (name, i, text) => {
      const f = named(name);
      const before = await reading(f.bytes);
      const bytes = withCard(f, i, (card) => {
        const name = card.slice(0, 8).trim();
        if (/^(OBJECT|COMMENT|HISTORY|OBSERVER|)$/.test(name) && !card.includes('BMAJ'))
          return `COMMENT ${text}`;
        if (card[8] !== '=' || card.includes("'") || card.startsWith('HIERARCH')) return card;
        return `${card.split('/')[0]!.trimEnd()} / ${text}`.slice(0, 80);
      });
      const after = await judged(bytes);
      if (isProblem(before) || isProblem(after)) throw new Error('a good file was refused');
      expect(after.places).toEqual(before.places);
      expect(after.head.wcs).toEqual(before.head.wcs);
      expect(after.head.shape).toEqual(before.head.shape);
    }),
    RUNS,
  );
});
