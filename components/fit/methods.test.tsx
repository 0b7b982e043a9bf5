import type { DoneFit } from './fitFacts';
import { methodsOf, methodsText } from './methods';

const p = (value: number, se: number | null, unit: string, more: object = {}) => ({
  value,
  se,
  lo: se === null ? null : value - se,
  hi: se === null ? null : value + se,
  unit,
  ...more,
});
const fit = (part: object = {}) =>
  ({
    model: 'sphere',
    errorBars: 'bootstrap',
    chi2: 61.24,
    dof: 55,
    parameters: {
      vExp: p(18.41, 0.7, 'km/s'),
      theta: p(1.312, 0.021, 'deg'),
      vSys: p(-40, 0.5, 'km/s'),
    },
    options: { setAside: true, bootstrap: 500 },
    provenance: { marks: 60, seed: 7, iterations: 20, startValues: {}, codeVersion: '0.1.0' },
    rings: [],
    traceId: null,
    extra: { setAside: [4], riseSigma: 9, channels: 6, bootstrap: { draws: 500, vExpUnbounded: 0 } },
    ...part,
  }) as unknown as DoneFit;

test('the paragraph holds the numbers with their errors, in the usual order', () => {
  const { paragraph } = methodsOf(fit(), 'Ring A');
  expect(paragraph).toContain('The rim of Ring A was marked by eye at 60 points in 6 velocity channels.');
  expect(paragraph).toContain('Θ = 1.312 ± 0.021°, v_sys = −40.0 ± 0.5 km/s, v_exp = 18.4 ± 0.7 km/s');
  expect(paragraph).toContain('χ² = 61.2 for 55 degrees of freedom');
  expect(paragraph).toContain('set aside: 1 of 60');
  expect(paragraph).toContain('500 draws');
  expect(paragraph).toContain('seed 7');
  expect(paragraph).toContain('bias common to all rings');
});

test('it cites what was used, and lists what it cites and no more', () => {
  const whole = methodsOf(fit(), 'A');
  expect(whole.references).toHaveLength(6);
  const plain = methodsOf(fit({ errorBars: 'covariance', options: { setAside: false, bootstrap: 0 } }), 'A');
  expect(plain.paragraph).toContain('Every point was kept.');
  expect(plain.references.join()).not.toMatch(/Efron|Beaton/);
  expect(plain.references.join()).toMatch(/Marquardt.*Orear.*Satterthwaite/);
  expect(methodsText(plain)).toContain('\n\nReferences\nHenderson');
});

test('constraints are named, and a held number says so', () => {
  const parameters = {
    ...fit().parameters,
    vSys: p(-40, null, 'km/s', { constraint: { fixed: -40 } }),
    vExp: p(18.41, 0.7, 'km/s', { constraint: { prior: { mean: 18, sd: 2 } } }),
  };
  const { paragraph } = methodsOf(fit({ parameters }), 'A');
  expect(paragraph).toContain('Constraints: v_sys held at −40 km/s; v_exp prior 18 ± 2 km/s.');
  expect(paragraph).toContain('v_sys = −40 km/s (held)');
});

test('a traced rim is not called marked by eye', () => {
  const { paragraph } = methodsOf(fit({ traceId: 't' }), 'A');
  expect(paragraph).toContain('traced from the brightness');
  expect(paragraph).not.toMatch(/by eye|bias common/);
});
