import { warningsOf, type Findings } from '@/shared/shell/warnings';

const fine: Findings = {
  model: 'sphere',
  settled: true,
  unconstrained: false,
  channels: 8,
  marks: 80,
  setAside: 0,
  seLnVExp: 0.05,
  reach: { low: -0.8, high: 0.8 },
  arcDeg: 340,
  riseSigma: 20,
  chi2PerDof: 1,
};

test('a good fit carries none', () => expect(warningsOf(fine)).toEqual([]));

test.each<[string, Partial<Findings>, string[], RegExp]>([
  ['three channels', { channels: 3 }, ['few-channels'], /no spare ring/],
  ['four channels', { channels: 4 }, ['few-channels'], /one spare ring/],
  ['five channels', { channels: 5 }, [], /^$/],
  ['1/v_exp^2 within two errors of zero', { seLnVExp: 0.26 }, ['vexp-unconstrained'], /1\.9 standard errors/],
  ['just beyond', { seLnVExp: 0.25 }, [], /^$/],
  ['v_exp at its bound', { unconstrained: true, settled: false }, ['vexp-unconstrained'], /lower end/],
  ['marks on one side', { reach: { low: 0.3, high: 0.9 } }, ['one-sided'], /only 0 % as far/],
  ['marks mostly on one side', { reach: { low: -0.1, high: 0.9 } }, ['one-sided'], /only 11 % as far/],
  ['a cap is one-sided by nature', { reach: { low: -0.9, high: -0.1 }, model: 'cap' }, [], /^$/],
  ['a short arc', { riseSigma: 2, arcDeg: 62 }, ['arc-too-short'], /62 degrees.*weakly measured/],
  ['an arc that is a line', { riseSigma: -0.5 }, ['arc-too-short'], /0\.0 times.*not measured: do not adopt/],
  ['one mark set aside', { setAside: 1 }, ['outliers'], /^1 of 80 marks lies/],
  ['marks set aside', { setAside: 3 }, ['outliers'], /^3 of 80 marks lie /],
  ['a fifth set aside', { setAside: 17 }, ['outliers', 'poor-fit'], /marks lie/],
  ['scatter over twice the stated', { chi2PerDof: 4.41 }, ['poor-fit'], /2\.1 times/],
  ['no start settled', { settled: false }, ['start-failed'], /did not settle/],
])('%s', (_what, change, codes, said) => {
  const warnings = warningsOf({ ...fine, ...change });
  expect(warnings.map((w) => w.code)).toEqual(codes);
  expect(warnings[0]?.message ?? '').toMatch(said);
});
