import { warningsOf, type Findings } from '@/shared/shell/warnings';

const fine: Findings = {
  settled: true,
  startSettled: true,
  stuck: false,
  atBounds: [],
  ledByPrior: [],
  vSysKnown: false,
  channelInVExp: 0.1,
  unconstrained: false,
  channels: 8,
  marks: 80,
  drawn: 0,
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
  [
    'one side is enough where v_sys is known',
    { reach: { low: -0.9, high: -0.1 }, vSysKnown: true },
    [],
    /^$/,
  ],
  ['a short arc', { riseSigma: 2, arcDeg: 62 }, ['arc-too-short'], /62 degrees.*weakly measured/],
  ['an arc that is a line', { riseSigma: -0.5 }, ['arc-too-short'], /0\.0 times.*not measured: do not adopt/],
  ['one mark set aside', { setAside: 1 }, ['outliers'], /^1 of 80 marks lies/],
  ['marks set aside', { setAside: 3 }, ['outliers'], /^3 of 80 marks lie /],
  ['a fifth set aside', { setAside: 17 }, ['outliers', 'poor-fit'], /marks lie/],
  ['scatter over twice the stated', { chi2PerDof: 4.41 }, ['poor-fit'], /2\.1 times/],
  ['circles drawn', { drawn: 16 }, ['drawn-circles'], /^16 of 80 marks were made by drawing circles/],
  ['no start settled', { settled: false, startSettled: false }, ['start-failed'], /did not settle/],
  ['steps used up', { settled: false }, ['not-converged'], /used up its steps/],
  ['a dead end', { stuck: true }, ['not-converged'], /no step brings it closer/],
  [
    'a bound reached',
    { atBounds: [{ what: 'v_exp', side: 'upper', bound: '12 km/s' }] },
    ['at-bound'],
    /v_exp at its upper bound, 12 km\/s/,
  ],
  [
    'a prior that says it all',
    { ledByPrior: ['v_sys', 'the radius'] },
    ['prior-dominated'],
    /v_sys and the radius/,
  ],
  ['channels over half of v_exp', { channelInVExp: 0.6 }, ['coarse-channels'], /0\.6 times as wide/],
  ['channels of half v_exp', { channelInVExp: 0.5 }, [], /^$/],
])('%s', (_what, change, codes, said) => {
  const warnings = warningsOf({ ...fine, ...change });
  expect(warnings.map((w) => w.code)).toEqual(codes);
  expect(warnings[0]?.message ?? '').toMatch(said);
});
