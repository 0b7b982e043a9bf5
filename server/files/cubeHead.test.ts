import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gunzipSync } from 'node:zlib';
import { isProblem, type Problem } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { planeStatistics, type PlaneStatistics } from '@/shared/fits/statistics';
import { separation } from '@/shared/sky/greatCircle';
import { buildWcs } from '@/shared/sky/wcs';
import manifest from '@/tests/reference/fits-corpus/manifest.json';
import kinds from '@/tests/reference/fits-kinds/manifest.json';
import { openDiskSource, type ByteSource } from './byteSource';
import { openPlain, type PlainSource } from './plainSource';
import { readPixel, readPlanes } from './planes';

const reference = join(__dirname, '../../tests/reference');
const folder = join(reference, 'fits-corpus');
const kindsFolder = join(reference, 'fits-kinds');

type Entry = (typeof manifest.files)[number] & { path: string; isPacked: boolean };

/** Every file with where it lies; `isPacked`: gzipped once more for keeping, which is undone before it is read. */
const entries: Entry[] = [
  ...manifest.files.map((f) => ({
    ...f,
    path: join(folder, f.file),
    isPacked: f.file.endsWith('.gz.gz'),
  })),
  ...(kinds.files as unknown as (Entry & { stored: string })[]).map((f) => ({
    ...f,
    path: join(kindsFolder, f.stored),
    isPacked: true,
  })),
];

/** What the refusal of a file must name: the card, or a word of the cause. */
const NAMED: Record<string, string | RegExp> = {
  'truncated-data.fits': /2812 bytes too early/,
  'truncated-header.fits': /ends inside its header/,
  'no-end.fits': 'END',
  'not-fits-png.fits': /PNG/,
  'not-fits-text.fits': /plain text/,
  'empty.fits': /empty/,
  'two-dimensional.fits': /2 axes/,
  'no-spectral-axis.fits': /spectral/,
  'one-channel.fits': 'NAXIS3',
  'unknown-spectral-type.fits': 'CTYPE3',
  'cdelt3-zero.fits': 'CDELT3',
  'cd-singular.fits': 'CD1_1',
  'naxis-huge.fits': /32000000000000 bytes/,
  'naxis-negative.fits': 'NAXIS2',
  'bitpix-12.fits': 'BITPIX',
  'naxis3-missing.fits': 'NAXIS3',
  'table-only.fits': /table/,
  'no-data.fits': /no image/,
  'simple-f.fits': 'SIMPLE',
  'text-for-number.fits': 'CRVAL3',
  'projections-differ.fits': 'CTYPE2',
  'bitpix-missing.fits': 'BITPIX',
  'unknown-projection.fits': 'CTYPE1',
  'gzip-truncated.fits.gz': /ends early/,
  'gzip-crc.fits.gz': /checksum/,
  'gzip-bomb.fits.gz.gz': /after its FITS data/,
  'many-cards.fits.gz': 'END',
};

interface Reading {
  head: CubeHead;
  statistics: PlaneStatistics[];
  infinite: number;
  values: (number | null)[];
}

/** Everything the product reads of a file, or why it refuses it. */
async function readAll(
  entry: Entry,
  at: { x: number; y: number; channel: number }[],
): Promise<Reading | Problem> {
  const source = await upload(entry);
  let plain: PlainSource | null = null;
  try {
    plain = await openPlain(source);
    const { head, pixels } = plain;
    const statistics = [];
    let infinite = 0;
    for await (const plane of readPlanes(pixels.source, pixels.head, { precise: true })) {
      statistics.push(planeStatistics(plane.values));
      infinite += plane.infinite;
    }
    const values = [];
    for (const p of at) values.push(await readPixel(pixels.source, pixels.head, p.x, p.y, p.channel));
    return { head, statistics, infinite, values };
  } catch (error) {
    if (isProblem(error)) return error;
    throw error;
  } finally {
    await plain?.close();
    await source.close();
  }
}

/** The file as it would be sent. */
async function upload({ path, isPacked }: Entry): Promise<ByteSource> {
  if (!isPacked) return openDiskSource(path);
  const bytes = gunzipSync(readFileSync(path));
  return {
    size: bytes.length,
    read: async (offset, length) => bytes.subarray(offset, offset + length),
    close: async () => undefined,
  };
}

const near = (value: number | null | undefined, wanted: number | null, relative: number) => {
  if (value === null || value === undefined || wanted === null) expect(value).toBe(wanted);
  else expect(Math.abs(value - wanted)).toBeLessThanOrEqual(relative * Math.abs(wanted));
};

it('has every file of the manifests', () => {
  const files = [folder, kindsFolder].flatMap((f) => readdirSync(f).map((name) => join(f, name)));
  const wanted = entries.map((e) => e.path);
  expect(files.filter((name) => !name.endsWith('manifest.json')).sort()).toEqual(wanted.sort());
});

describe.each(entries)('$file: $kind', (file) => {
  const at = file.at ?? [];
  let reading: Reading | Problem;
  let tookMs = 0;
  let tookBytes = 0;
  beforeAll(async () => {
    const before = process.memoryUsage.rss();
    const start = process.cpuUsage(); // of this process: other work on the machine does not count
    reading = await readAll(file, at);
    const { user, system } = process.cpuUsage(start);
    tookMs = (user + system) / 1000;
    tookBytes = process.memoryUsage.rss() - before;
  });

  it('takes little time and memory', () => {
    expect(tookMs).toBeLessThan(1000);
    expect(tookBytes).toBeLessThan(100e6);
  });

  it('comes out as expected', () => {
    const outcomes = [file.expectation, ...(file.alsoAcceptable as string[])];
    const named = NAMED[file.file];
    if (isProblem(reading)) {
      expect(outcomes).toContain('error');
      if (typeof named === 'string') expect(reading.extra.card).toBe(named);
      else if (named) expect(reading.detail).toMatch(named);
    } else if (reading.statistics.every((s) => s.min === null)) {
      expect(outcomes).toContain('error'); // every pixel blank: whoever reads the pixels refuses
    } else {
      expect(outcomes).toContain(
        reading.head.cautions.length + reading.infinite > 0 ? 'ok-with-caution' : 'ok',
      );
    }
  });

  if (!file.shape) return;

  it('is described as the reference has it', () => {
    const { head } = reading as Reading;
    const { bitpix, unit, bunit, object, frame, equinox, projection, hdu, shape, beam } = file;
    expect(head).toMatchObject({ bitpix, unit, bunit, object, frame, equinox, projection, hdu, shape, beam });
    const { ctype, type, convention, restFrequencyHz } = file.spectral!;
    expect(head.spectral).toMatchObject({
      ctype,
      type,
      convention,
      restFrequencyHz,
      frame: file.spectral!.frame,
    });
    head.spectral.velocities.forEach((v, i) => expect(v).toBeCloseTo(file.spectral!.velocities[i]!, 9));
  });

  it('has the reference statistics', () => {
    const { statistics } = reading as Reading;
    expect(statistics).toHaveLength(file.stats!.length);
    file.stats!.forEach((wanted, k) => {
      near(statistics[k]!.min, wanted.min, 1e-12);
      near(statistics[k]!.max, wanted.max, 1e-12);
      near(statistics[k]!.mean, wanted.mean, 1e-9);
      near(statistics[k]!.rms, wanted.rms, 1e-9);
      expect(statistics[k]!.blank).toBe(wanted.blank);
    });
  });

  it('has the reference values and places', () => {
    const { head, values } = reading as Reading;
    const wcs = buildWcs(head.wcs);
    at.forEach((p, i) => {
      near(values[i], p.value, 1e-12);
      near(wcs.frequencyHzOf(p.channel), p.frequencyHz, 1e-12);
      expect(Math.abs(wcs.velocityOf(p.channel) - p.velocity)).toBeLessThan(1e-6);
      const sky = wcs.pixelToSky(p.x, p.y);
      const galactic = wcs.pixelToGalactic(p.x, p.y);
      if (p.lon === null) expect([sky, galactic]).toEqual([null, null]);
      else {
        expect(separation(sky!, { lon: p.lon, lat: p.lat! })).toBeLessThan(1e-9);
        expect(separation({ lon: galactic!.l, lat: galactic!.b }, { lon: p.l!, lat: p.b! })).toBeLessThan(
          1e-9,
        );
      }
    });
  });
});
