import { execFile } from 'node:child_process';
import { mkdtemp, readFile, rm, truncate, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fitCommand } from './fit/command';
import { outcomeOf, type Outcome } from './headless';
import cubeMarks from '@/tests/reference/cube-marks.json';

const root = join(__dirname, '..');
const reference = join(root, 'tests/reference/shells');
const load = async (path: string) => JSON.parse(await readFile(join(reference, path), 'utf8'));

/** In this process; starting one takes a second. */
const fit = (...args: string[]) => outcomeOf(fitCommand, args);
const asProgram = (...args: string[]): Promise<Outcome> =>
  new Promise((resolve) => {
    execFile(
      process.execPath,
      ['--import', 'tsx', 'scripts/fit.ts', ...args],
      { cwd: root },
      (error, stdout, stderr) => resolve({ code: Number(error?.code ?? 0), stdout, stderr }),
    );
  });

let folder: string;
beforeAll(async () => (folder = await mkdtemp(join(tmpdir(), 'fit-'))));
afterAll(() => rm(folder, { recursive: true }));
const file = async (name: string, content: unknown) => {
  const path = join(folder, name);
  await writeFile(path, typeof content === 'string' ? content : JSON.stringify(content));
  return path;
};

const KEYS =
  'model status parameters correlation chi2 dof aicc bic errorBars warnings residuals provenance extra rings';

describe('npm run fit', () => {
  it('as a program prints the same, and ends with the same code', async () => {
    const marks = join(reference, 'cases/01-full-8x10.json');
    for (const args of [
      [marks, '--bootstrap=20'],
      [marks, '--model=cube'],
    ])
      expect(await asProgram(...args)).toEqual(await fit(...args));
  });

  it('prints one fit of marks on the sky and nothing else', async () => {
    const { code, stdout, stderr } = await fit(join(reference, 'cases/01-full-8x10.json'));
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
    const found = JSON.parse(stdout);
    expect(Object.keys(found)).toEqual(KEYS.split(' '));
    expect(found).toMatchObject({ model: 'sphere', status: 'done', errorBars: 'covariance', dof: 75 });
    expect(found.rings[0]).toMatchObject({ channel: null, marks: 10 });
    const { parameters } = (await load('cases/01-full-8x10.fit.json')).fit;
    expect(found.parameters.theta.value).toBeCloseTo(parameters.theta.value, 6);
  });

  it('takes a model, draws and a seed, and repeats itself', async () => {
    const marks = join(reference, 'cases/04-cap-near-prior.json');
    const args = [marks, '--model', 'cap', '--bootstrap=80', '--seed', '3'];
    const [first, second] = await Promise.all([fit(...args), fit(...args)]);
    expect(first.code).toBe(0);
    expect(first.stdout).toBe(second.stdout);
    expect(JSON.parse(first.stdout)).toMatchObject({
      model: 'cap',
      errorBars: 'bootstrap',
      provenance: { seed: 3 },
    });
  });

  it('begins where it is told to, and ends at the same shell', async () => {
    const { code, stdout } = await fit(
      join(reference, 'cases/01-full-8x10.json'),
      '--start=3,-30,20',
      '--seed=1',
    );
    expect(code).toBe(0);
    const found = JSON.parse(stdout);
    expect(found.provenance.startValues).toMatchObject({ vSys: -30 });
    expect(found.provenance.startValues.theta).toBeCloseTo(3, 9);
    const { parameters } = (await load('cases/01-full-8x10.fit.json')).fit;
    expect(found.parameters.theta.value).toBeCloseTo(parameters.theta.value, 6);
  });

  it.each(cubeMarks.cubes.map((c) => [c.name, c] as const))(
    'reads marks off a cube: %s',
    async (name, cube) => {
      const cards = [...cube.cards, 'END'].map((card) => card.padEnd(80)).join('');
      const header = cards.padEnd(Math.ceil(cards.length / 2880) * 2880);
      const path = await file(`${name}.fits`, header);
      await truncate(path, header.length + 16_000_000); // pixels do not matter here: zeros, not even stored
      const sky = await load(`cubes/${name}.sky-marks.json`);
      const marks = cube.marks.map(({ channel, x, y }, i) => ({ channel, x, y, sigma: sky.marks[i].sigma }));
      const { code, stdout, stderr } = await fit(path, await file(`${name}.json`, { marks }));
      expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
      const found = JSON.parse(stdout);
      const expected = (await load(`cubes/${name}.fit.json`)).fit;
      for (const parameter of Object.keys(expected.parameters)) {
        const off = Math.abs(found.parameters[parameter].value - expected.parameters[parameter].value);
        expect(off).toBeLessThan(1e-3 * expected.reference.leastSquares.se[parameter]);
      }
      const channels = [...new Set(cube.marks.map((m) => m.channel))];
      expect(found.rings.map((r: { channel: number }) => r.channel).sort()).toEqual(channels.sort());
    },
  );

  it('holds, bounds and informs parameters, the command line before the file', async () => {
    const marks = join(reference, 'cases/04-cap-near-prior.json');
    const { code, stdout } = await fit(
      ...[marks, '--model=cap', '--prior', 'vSys=5.4,0.5', '--bound=theta=1,', '--fix=l=155.01'],
    );
    expect(code).toBe(0);
    const { parameters, dof } = JSON.parse(stdout);
    expect(parameters.vSys.constraint).toEqual({ prior: { mean: 5.4, sd: 0.5 } });
    expect(parameters.theta.constraint).toEqual({ low: 1 });
    expect(parameters.l).toMatchObject({ value: 155.01, se: 0, constraint: { fixed: 155.01 } });
    const { fit: plain } = await load('cases/04-cap-near-prior.fit.json');
    expect(dof).toBe(plain.dof + 1);
    expect(parameters.vExp.constraint).toBeUndefined();
  });

  it('takes marks of drawn circles for what they are', async () => {
    const json = await load('cases/01-full-8x10.json');
    json.marks = json.marks.map((m: object) => ({ ...m, drawn: true }));
    const { code, stdout } = await fit(await file('drawn.json', json));
    expect(code).toBe(0);
    expect(JSON.parse(stdout).warnings).toContainEqual(expect.objectContaining({ code: 'drawn-circles' }));
  });

  it('keeps all marks when told so', async () => {
    const marks = join(reference, 'cases/07-outliers.json');
    const [on, off] = await Promise.all([fit(marks, '--robust=on'), fit(marks, '--robust', 'off')]);
    expect(JSON.parse(on.stdout).extra.setAside.length).toBeGreaterThan(0);
    expect(JSON.parse(off.stdout).extra.setAside).toEqual([]);
  });

  const good = () => load('cases/02-few-4x6.json');
  it.each([
    ['no file', async () => ['nowhere.json'], 'invalid-input', 'marks'],
    ['no argument', async () => [], 'invalid-input', 'marks'],
    [
      'NaN',
      async () => [await file('nan.json', '{"channelWidth": 1, "marks": [{"l": NaN}]}')],
      'malformed-json',
      undefined,
    ],
    ['half a file', async () => [await file('half.json', '{"marks": [')], 'malformed-json', undefined],
    ['no marks', async () => [await file('none.json', { channelWidth: 1 })], 'invalid-input', 'marks'],
    [
      'no channel width',
      async () => [await file('width.json', { marks: [] })],
      'invalid-input',
      'channelWidth',
    ],
    [
      'text in a mark',
      async () => {
        const json = await good();
        json.marks[3].sigma = 'small';
        return [await file('text.json', json)];
      },
      'invalid-input',
      'marks.3.sigma',
    ],
    [
      'one channel',
      async () => {
        const json = await good();
        json.marks = json.marks.map((m: object) => ({ ...m, velocity: 20 }));
        return [await file('one.json', json)];
      },
      'marks-insufficient',
      'marks',
    ],
    [
      'an unknown model',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--model', 'cube'],
      'invalid-input',
      'model',
    ],
    [
      'an unknown option',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--fast', '1'],
      'invalid-input',
      'fast',
    ],
    [
      'half a draw',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--bootstrap', '0.5'],
      'invalid-input',
      'bootstrap',
    ],
    [
      'an unknown parameter',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--fix', 'size=3'],
      'invalid-input',
      'constraints.size',
    ],
    [
      'half a start',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--start=3,-30'],
      'invalid-input',
      'start',
    ],
    [
      'half a prior',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--prior', 'theta=3'],
      'invalid-input',
      'prior',
    ],
    [
      'a bound in words',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--bound', 'theta=small,large'],
      'invalid-input',
      'bound',
    ],
    [
      'no bound at all',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--bound', 'theta=,'],
      'invalid-input',
      'bound',
    ],
    [
      'bounds the wrong way round',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--bound', 'theta=3,2'],
      'invalid-input',
      'constraints.theta.low',
    ],
    [
      'a parameter held twice',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--fix=theta=2', '--fix=theta=3'],
      'invalid-input',
      'fix',
    ],
    [
      'held and under a prior',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--fix=theta=2', '--prior=theta=3,1'],
      'invalid-input',
      'constraints.theta',
    ],
    [
      'a robust fit that is neither on nor off',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--robust=maybe'],
      'invalid-input',
      'robust',
    ],
    [
      'a trace without a cube',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--trace=ridge'],
      'invalid-input',
      'trace',
    ],
    [
      'a cap without v_sys',
      async () => [join(reference, 'cases/02-few-4x6.json'), '--model=cap'],
      'invalid-input',
      'vSys',
    ],
    [
      'no cube',
      async () => ['nowhere.fits', await file('empty.json', { marks: [] })],
      'invalid-input',
      'cube',
    ],
    [
      'a cube that is none',
      async () => [await file('fake.fits', 'no FITS'.repeat(900)), await file('empty.json', { marks: [] })],
      'not-fits',
      undefined,
    ],
  ] as const)('%s is the input at fault: exit code 2 and the reason', async (_what, args, type, field) => {
    const { code, stdout, stderr } = await fit(...(await args()));
    expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
    const problem = JSON.parse(stderr);
    expect(problem).toMatchObject({ type: `/problems/${type}` });
    expect(problem.field).toBe(field);
    expect(problem.detail.length).toBeGreaterThan(20);
  });
});
