import { errorBarOf, limitsOf } from './errorBarWords';
import type { DoneFit } from './fitFacts';

const p = (value: number, lo: number | null = value - 1, hi: number | null = value + 1) => ({
  value,
  se: 1,
  lo,
  hi,
  unit: '',
});
const fit = (part: object = {}, extra: object = {}) =>
  ({
    errorBars: 'bootstrap',
    parameters: { theta: p(1), vExp: p(10) },
    rings: [],
    traceId: null,
    options: { bootstrap: 500 },
    extra: { channels: 8, sigmaUsedDeg: 0.05, arcDeg: 340, ...extra },
    ...part,
  }) as unknown as DoneFit;
const keys = (f: DoneFit) => limitsOf(f).map((l) => l.key);

test('the error bar is named with what it covers', () => {
  expect(errorBarOf(fit()).name).toBe('Channel-aware bootstrap, 500 draws');
  expect(errorBarOf(fit({ errorBars: 'covariance' })).name).toBe('Four-source covariance');
  expect(errorBarOf(fit()).covers).toMatch(/68 %.*rings that differ in radius/);
});

test('many channels leave only the bias that no error bar sees, beside Θ and in degrees', () => {
  expect(keys(fit())).toEqual(['common-bias']);
  expect(limitsOf(fit())[0]).toMatchObject({ beside: ['theta'] });
  expect(limitsOf(fit())[0]!.text).toContain('make Θ 0.025° too large');
});

test.each([
  [3, 'three-channels'],
  [4, 'four-channels'],
])('%i channels are said to be few, with what that did to coverage', (channels, key) => {
  const [limit] = limitsOf(fit({}, { channels }));
  expect(limit).toMatchObject({ key, beside: [] });
  expect(limit!.text).toMatch(/held the truth in \d\d/);
});

test('five channels are not called few', () =>
  expect(keys(fit({}, { channels: 5 }))).toEqual(['common-bias']));

test('an unbounded v_exp is a limit to report, with the share of draws', () => {
  const f = fit(
    { parameters: { theta: p(1), vExp: p(30, 21.44, null) } },
    { bootstrap: { draws: 500, vExpUnbounded: 96 } },
  );
  const limit = limitsOf(f).find((l) => l.key === 'no-upper-bound')!;
  expect(limit.beside).toEqual(['vExp']);
  expect(limit.text).toContain('96 of 500 draws ran without end');
  expect(limit.text).toContain('v_exp > 21.4 km/s (84 %)');
});

test('a held v_exp has no bounds to miss', () => {
  const held = { ...p(30, 21, null), constraint: { fixed: 30 } };
  expect(keys(fit({ parameters: { theta: p(1), vExp: held } }))).toEqual(['common-bias']);
});

test('short noisy arcs are told to use the bootstrap, and only without it', () => {
  const extra = { arcDeg: 120, sigmaUsedDeg: 0.1 };
  expect(keys(fit({ errorBars: 'covariance' }, extra))).toContain('short-noisy-arc');
  expect(keys(fit({}, extra))).not.toContain('short-noisy-arc');
});

test('a traced rim says what is added instead of a person’s bias', () =>
  expect(keys(fit({ traceId: 't' }))).toEqual(['traced']));
