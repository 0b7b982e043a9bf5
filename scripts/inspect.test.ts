import { execFile } from 'node:child_process';
import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { outcomeOf, type Outcome } from './headless';
import { inspectCommand } from './inspect/command';
import { headerBytesOf } from '@/tests/reference/headerBytes';

const root = join(__dirname, '..');
const corpus = join(root, 'tests/reference/fits-corpus');

const work = mkdtempSync(join(tmpdir(), 'inspect-'));
const { TMPDIR } = process.env;
beforeAll(() => {
  process.env.TMPDIR = work;
});
afterAll(() => {
  if (TMPDIR === undefined) delete process.env.TMPDIR;
  else process.env.TMPDIR = TMPDIR;
  rmSync(work, { recursive: true });
});

/** In this process; starting one takes a second. */
const inspect = (...args: string[]) => outcomeOf(inspectCommand, args);
const asProgram = (...args: string[]): Promise<Outcome> =>
  new Promise((resolve) => {
    execFile(
      process.execPath,
      ['--import', 'tsx', 'scripts/inspect.ts', ...args],
      { cwd: root },
      (error, stdout, stderr) => resolve({ code: Number(error?.code ?? 0), stdout, stderr }),
    );
  });

describe('npm run inspect', () => {
  it('as a program prints the same, and ends with the same code', async () => {
    for (const args of [[join(corpus, 'bitpix8.fits'), '--at=2,0,1'], [join(corpus, 'bitpix-12.fits')]])
      expect(await asProgram(...args)).toEqual(await inspect(...args));
  });

  it('prints one object about a cube, its places and its channels', async () => {
    const file = join(corpus, 'bitpix8.fits');
    const { code, stdout, stderr } = await inspect(
      file,
      '--at=2,0,1',
      '--at',
      '0.5,-3,5',
      '--from=118.15,-0.3,-56.69',
      '--stats',
    );
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
    const seen = JSON.parse(stdout);
    expect(Object.keys(seen)).toEqual(
      'shape bitpix unit frame projection spectral beam cautions at from stats'.split(' '),
    );
    expect(seen).toMatchObject({
      shape: { nx: 8, ny: 7, channels: 6 },
      bitpix: 8,
      unit: 'K',
      frame: 'galactic',
      projection: 'CAR',
      spectral: { type: 'VRAD', convention: 'radio', frame: 'LSRK', restFrequencyHz: 1420405751.768 },
      beam: null,
      cautions: [],
    });
    expect(seen.at[0]).toMatchObject({ x: 2, y: 0, channel: 1, velocity: -56.69, value: 2.125 });
    expect(seen.at[0].l).toBeCloseTo(118.15, 10);
    expect(seen.at[1]).toMatchObject({ x: 0.5, y: -3, value: null });
    expect(seen.from[0].x).toBeCloseTo(2, 9);
    expect(seen.from[0].channel).toBeCloseTo(1, 9);
    expect(seen.stats).toHaveLength(6);
    expect(seen.stats[0]).toMatchObject({ channel: 0, min: -2.625, max: 8.5, blank: 5 });
    expect(seen.stats[0].noise).toBeGreaterThan(0);
  });

  it('counts infinities as blank, and says so', async () => {
    const { stdout } = await inspect(join(corpus, 'infinities.fits'), '--stats');
    expect(JSON.parse(stdout).cautions).toEqual([
      expect.stringMatching(/infinite values are counted as blank/),
    ]);
  });

  it('reads the named HDU', async () => {
    const { stdout } = await inspect(join(corpus, 'two-cubes.fits'), '--hdu=2');
    expect(JSON.parse(stdout).cautions).toEqual([]);
  });

  const packed = join(root, 'tests/reference/fits-corpus-compressed');
  it.each([
    ['gzip', join(corpus, 'gzipped.fits.gz')],
    ['tiles', join(packed, 'rice-float32-dither1.fits')],
    ['tiles in gzip', join(packed, 'rice-int32.fits.gz')],
  ])('reads %s through a copy that it removes', async (_what, file) => {
    const copies = () => readdirSync(work).filter((name) => name.includes('.plain'));
    const { code, stdout, stderr } = await inspect(file, '--at=3,2,1', '--stats');
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
    const seen = JSON.parse(stdout);
    expect(seen.at[0].value).toEqual(expect.any(Number));
    expect(seen.stats).toHaveLength(seen.shape.channels);
    expect(copies()).toEqual([]);
  });

  it('reads the named plane of a Stokes axis', async () => {
    const file = join(work, 'stokes.fits');
    const cards = [
      'SIMPLE  = T',
      'BITPIX  = 8',
      'NAXIS   = 4',
      ...[2, 2, 2, 3].map((n, i) => `NAXIS${i + 1}  = ${n}`),
    ];
    const types = ['GLON-CAR', 'GLAT-CAR', 'VRAD', 'STOKES'].map((t, i) => `CTYPE${i + 1}  = '${t}'`);
    const pixels = Buffer.alloc(2880, 0);
    for (let i = 0; i < 24; i++) pixels[i] = i;
    writeFileSync(file, Buffer.concat([headerBytesOf([...cards, ...types]), pixels]));
    const first = JSON.parse((await inspect(file, '--at=1,0,1')).stdout);
    expect(first.at[0].value).toBe(5);
    expect(first.cautions.join()).toMatch(/3 planes; the first is read/);
    const third = JSON.parse((await inspect(file, '--at=1,0,1', '--stokes=2')).stdout);
    expect(third.at[0].value).toBe(21);
    expect(third.cautions.join()).not.toMatch(/planes/);
    expect((await inspect(file, '--stokes=3')).stderr).toMatch(/no plane 3/);
  });

  it.each([
    ['a file that is no cube', [join(corpus, 'two-dimensional.fits')], '/problems/fits-shape'],
    ['a cube of blanks', [join(corpus, 'all-blank.fits')], '/problems/fits-shape'],
    [
      'a cube of blanks, with statistics',
      [join(corpus, 'all-blank.fits'), '--stats'],
      '/problems/fits-shape',
    ],
    ['a bad card', [join(corpus, 'bitpix-12.fits')], '/problems/fits-card'],
    ['a file that is not there', [join(corpus, 'none.fits')], '/problems/invalid-input'],
    ['a folder', [corpus], '/problems/invalid-input'],
    ['no file', [], '/problems/invalid-input'],
    ['a place that is none', [join(corpus, 'bitpix8.fits'), '--at=1,2'], '/problems/invalid-input'],
    ['an unknown option', [join(corpus, 'bitpix8.fits'), '--what'], '/problems/invalid-input'],
  ])('refuses %s with code 2', async (_what, args, type) => {
    const { code, stdout, stderr } = await inspect(...args);
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    expect(JSON.parse(stderr)).toMatchObject({ type, detail: expect.any(String) });
  });
});
