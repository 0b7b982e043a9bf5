import { incompleteBeta, lnGamma, tHalfWidth, upperF } from '@/shared/shell/studentT';

// scipy 1.10.1: stats.t.ppf(0.84135, nu), stats.f.sf, special.betainc, special.gammaln
const halfWidths = [
  [1, 1.837409429490547],
  [1.5, 1.4668573887584955],
  [2, 1.3213154624456933],
  [3.7, 1.1546985256661264],
  [6, 1.0905949070768344],
  [12.25, 1.0425398248113018],
  [40, 1.0126794918225304],
  [1000, 1.0005219851163694],
  [10000, 1.000071717994601],
];
const wide = [
  [1, 12.706204736174694],
  [2.5, 3.5746548420036817],
  [8, 2.306004135204166],
  [100, 1.9839715185235518],
];
const tails = [
  [0.5, 2, 4.2, 0.6385817286864244],
  [3, 2, 7, 0.11456221633906807],
  [12, 2, 31.5, 0.00013359085764519998],
  [40, 2, 60, 9.13474526934901e-12],
  [1, 5, 9, 0.4695236714439575],
];
const betas = [
  [0.001, 0.5, 3, 0.05925318951594623],
  [0.3, 2, 5, 0.5798250000000003],
  [0.9, 0.5, 5000, 1.0],
  [0.999, 40, 0.5, 0.777919867635688],
  [0.5, 1000, 1000, 0.4999999999999992],
];
const gammas = [
  [0.01, 4.599479878042022],
  [0.5, 0.5723649429247],
  [1, 0.0],
  [2, 0.0],
  [3.3, 0.9870985778947343],
  [9.99, 12.779315214350195],
  [10, 12.801827480081469],
  [171, 706.5730622457875],
  [5000.5, 37586.88488728106],
];

const close = (mine: number, theirs: number, tolerance: number) =>
  expect(Math.abs(mine - theirs)).toBeLessThanOrEqual(tolerance * Math.max(Math.abs(theirs), 0.1));

test.each(halfWidths)('t, %d degrees of freedom', (nu, t) => close(tHalfWidth(nu!), t!, 1e-11));
test.each(wide)('t at 95 %%, %d degrees of freedom', (nu, t) => close(tHalfWidth(nu!, 0.95), t!, 1e-11));
test.each(tails)('F = %d with %d and %d', (f, m, n, p) => close(upperF(f!, m!, n!), p!, 1e-11));
test.each(betas)('I_x(a, b) at %d, %d, %d', (x, a, b, value) =>
  close(incompleteBeta(x!, a!, b!), value!, 1e-10),
);
test.each(gammas)('ln Gamma(%d)', (x, value) => close(lnGamma(x!), value!, 1e-13));

test('the ends of their ranges', () => {
  expect(incompleteBeta(0, 2, 3)).toBe(0);
  expect(incompleteBeta(1, 2, 3)).toBe(1);
  expect(upperF(0, 2, 3)).toBe(1);
});
