import fc from 'fast-check';
import { isProblem, type Problem } from '@/shared/contract/problem';
import { destination } from '@/shared/sky/greatCircle';
import { fitShell } from '@/shared/shell/fit';
import type { FitInput, SkyMark } from '@/shared/shell/fitInput';

const ring = (velocity: number, radius: number, count = 6): SkyMark[] =>
  Array.from({ length: count }, (_, i) => {
    const { lon, lat } = destination({ lon: 100, lat: 10 }, (360 / count) * i, radius);
    return { l: lon, b: lat, velocity, sigma: 0.05 };
  });
const good: FitInput = { channelWidth: 1, marks: [...ring(-8, 1.7), ...ring(0, 2), ...ring(8, 1.7)] };

function refusal(input: FitInput, options = {}): Problem {
  try {
    fitShell(input, options);
  } catch (error) {
    if (isProblem(error)) return error;
    throw error;
  }
  throw new Error('the fit was not refused');
}

const withMark = (at: number, change: object): FitInput => ({
  ...good,
  marks: good.marks.map((m, i) => (i === at ? { ...m, ...change } : m)),
});

test.each([
  ['a velocity that is no number', withMark(3, { velocity: NaN }), 'marks.3.velocity'],
  ['an infinite longitude', withMark(0, { l: Infinity }), 'marks.0.l'],
  ['a latitude beyond the pole', withMark(5, { b: 90.5 }), 'marks.5.b'],
  ['an error of zero', withMark(3, { sigma: 0 }), 'marks.3.sigma'],
  ['a negative error', withMark(7, { sigma: -0.1 }), 'marks.7.sigma'],
  ['text for a number', withMark(2, { l: '118.2' }), 'marks.2.l'],
  ['a channel width of zero', { ...good, channelWidth: 0 }, 'channelWidth'],
  ['no channel width', { marks: good.marks } as unknown as FitInput, 'channelWidth'],
  ['a v_sys that is no number', { ...good, vSys: { value: NaN } }, 'vSys.value'],
  ['a negative error of v_sys', { ...good, vSys: { value: 0, sigma: -1 } }, 'vSys.sigma'],
])('%s is refused and named', (_what, input, field) => {
  const problem = refusal(input);
  expect(problem.type).toBe('invalid-input');
  expect(problem.extra.field).toBe(field);
  expect(problem.detail).toMatch(/\.$/);
});

test('the cap model needs v_sys', () => {
  expect(refusal(good, { model: 'cap' }).extra.field).toBe('vSys');
});

test.each([
  ['no marks', [], '0 different marks on 0 channels'],
  ['one channel', ring(0, 2, 12), 'mark the rim on 2 more channels.'],
  ['two channels', [...ring(0, 2), ...ring(5, 1.8)], 'mark the rim on 1 more channel.'],
  ['five marks', [...ring(-5, 1.7, 2), ...ring(0, 2, 2), ...ring(5, 1.7, 1)], 'add at least 1 more mark.'],
  [
    'marks given twice',
    [...ring(-5, 1.7, 2), ...ring(0, 2, 2), ...ring(0, 2, 2), ...ring(5, 1.7, 1)],
    '5 different marks',
  ],
])('%s cannot constrain a shell', (_what, marks, said) => {
  const problem = refusal({ ...good, marks });
  expect(problem.type).toBe('marks-insufficient');
  expect(problem.detail).toContain(said);
});

test('two more parameters need more marks', () => {
  const marks = [...ring(-5, 1.7, 2), ...ring(0, 2, 3), ...ring(5, 1.7, 2)];
  expect(refusal({ ...good, marks }, { model: 'elliptical' }).detail).toContain('at least 8 marks');
});

test.each([
  ['at one point', (v: number) => ring(v, 1e-9)],
  ['along a meridian', (v: number) => ring(v, 2).map((m, i) => ({ ...m, l: 40, b: i + v / 10 }))],
  ['along a parallel', (v: number) => ring(v, 2).map((m, i) => ({ ...m, l: 40 + i / 2 + v / 20, b: -3 }))],
  [
    'along a slanted line',
    (v: number) => ring(v, 2).map((m, i) => ({ ...m, l: 40 + i / 8 + v / 50, b: i / 10 + v / 62.5 })),
  ],
])('marks %s are refused', (_what, marksAt) => {
  const problem = refusal({ ...good, marks: [-8, 0, 8].flatMap(marksAt) });
  expect(problem.type).toBe('marks-degenerate');
});

test('an expansion beyond the span of the marks is fitted, with what bounds it said', () => {
  const marks = [-3, -1.5, 0, 1.5, 3].flatMap((v) => ring(v, 2 * Math.sqrt(1 - (v / 60) ** 2)));
  const fit = fitShell({ ...good, marks });
  expect(fit.warnings.map((w) => w.code)).toContain('vexp-unconstrained');
  expect(fit.parameters.vExp!.hi).toBeNull();
  expect(fit.parameters.vExp!.lo!).toBeLessThan(60);
});

test('a hundred thousand marks are answered in seconds', () => {
  const marks = Array.from({ length: 50 }, (_, k) => {
    const v = -12 + k / 2;
    return ring(v, 2 * Math.sqrt(1 - (v / 15) ** 2), 2000);
  }).flat();
  expect(marks).toHaveLength(100_000);
  const from = process.cpuUsage();
  const fit = fitShell({ ...good, channelWidth: 0.5, marks }, { optimiser: 'live', extras: true });
  const { user } = process.cpuUsage(from);
  expect(Math.abs(fit.parameters.vExp!.value - 15)).toBeLessThan(0.1);
  expect(user / 1e6).toBeLessThan(20);
}, 120_000);

test('rings that grow away from v_sys are fitted with a warning, not an error', () => {
  const marks = [...ring(-8, 2.4), ...ring(-4, 2.1), ...ring(0, 2), ...ring(4, 2.1), ...ring(8, 2.4)];
  const fit = fitShell({ ...good, marks });
  expect(fit.warnings.map((w) => w.code)).toContain('vexp-unconstrained');
  expect(fit.parameters.vExp!.hi).toBeNull();
  expect(() => JSON.parse(JSON.stringify(fit))).not.toThrow();
  expect(JSON.stringify(fit)).not.toMatch(/NaN|Infinity/);
});

test('a short straight arc says that the radius is not measured', () => {
  const marks = [-8, -4, 0, 4, 8].flatMap((v) =>
    Array.from({ length: 6 }, (_, i) => {
      const wobble = 0.04 * Math.sin(7 * i + v);
      const { lon, lat } = destination({ lon: 100, lat: 10 }, 3 * i, 2 - 0.002 * v * v + wobble);
      return { l: lon, b: lat, velocity: v, sigma: 0.05 };
    }),
  );
  const warning = fitShell({ ...good, marks }).warnings.find((w) => w.code === 'arc-too-short');
  expect(warning?.message).toContain('not measured');
});

test('whatever the marks, the answer is a fit that JSON can carry or a problem with a reason', () => {
  const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
  const mark = fc.record(
    {
      l: number(0, 360),
      b: number(-90, 90),
      velocity: fc.oneof(fc.integer({ min: -5, max: 5 }), number(-1e6, 1e6)),
      sigma: number(1e-9, 90),
    },
    { requiredKeys: ['l', 'b', 'velocity'] },
  );
  const close = fc.record({
    l: number(100, 100.001),
    b: fc.oneof(number(10, 10.001), fc.constant(10)),
    velocity: fc.integer({ min: -3, max: 3 }),
    sigma: fc.constantFrom(0.0001, 1),
  });
  const marks = fc.oneof(fc.array(mark, { maxLength: 40 }), fc.array(close, { minLength: 6, maxLength: 40 }));
  const width = fc.constantFrom(1e-6, 1, 3, 1e5);
  const model = fc.constantFrom('sphere', 'cap', 'drifting', 'elliptical');
  const vSys = fc.constantFrom({ value: 0, sigma: 0 }, { value: 1, sigma: 2 }, { value: 1e5, sigma: 1e-6 });
  fc.assert(
    fc.property(marks, width, model, vSys, (list, channelWidth, name, known) => {
      try {
        const input = { marks: list, channelWidth, vSys: known };
        const fit = fitShell(input, { model: name as 'sphere', bootstrap: 3 });
        expect(JSON.parse(JSON.stringify(fit))).toEqual(fit);
        for (const { value } of Object.values(fit.parameters)) expect(Number.isFinite(value)).toBe(true);
        expect(Number.isFinite(fit.chi2)).toBe(true);
        fit.residuals.forEach((r) => expect(Number.isFinite(r.degrees)).toBe(true));
      } catch (error) {
        if (!isProblem(error)) throw error;
        expect(error.detail).toMatch(/\.$/);
      }
    }),
    { numRuns: 400 },
  );
});
