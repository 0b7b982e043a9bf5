import type { FitOutcome } from '@/shared/contract/fits';
import { byLargest, chi2PerDof, isDone, markPoints, modelOf, ringsOf, roundRadius } from './fitFacts';

const p = (value: number) => ({ value, se: 0.1, lo: value - 0.1, hi: value + 0.1, unit: 'km/s' });
const fit = {
  parameters: { l: p(10), b: p(0), theta: p(2), vSys: p(-40), vExp: p(15) },
  correlation: { names: [], matrix: [] },
  chi2: 50,
  dof: 40,
  residuals: [
    { mark: 0, degrees: 0.01, weight: 1 },
    { mark: 1, degrees: -0.3, weight: 0 },
    { mark: 2, degrees: 0.2, weight: 1 },
  ],
  rings: [
    { channel: 3, velocity: -45, theta: 1.8, se: 0.1, marks: 6, model: 1.9 },
    { channel: 4, velocity: -44, theta: null, se: null, marks: 2, model: 1.9 },
  ],
} as unknown as FitOutcome;

test('residuals come largest first, whatever their sign', () => {
  expect(byLargest(fit).map((r) => r.mark)).toEqual([1, 2, 0]);
  expect(fit.residuals.map((r) => r.mark)).toEqual([0, 1, 2]);
});

test('a channel without a ring is not a point of the diagram', () =>
  expect(ringsOf(fit).map((r) => r.channel)).toEqual([3]));

test('the curve needs radius, systemic and expansion velocity', () => {
  expect(modelOf(fit)).toMatchObject({ theta: 2, vSys: -40, vExp: 15 });
  expect(modelOf({ ...fit, parameters: { theta: p(1) } })).toBeNull();
});

test('a fit without degrees of freedom has no quality', () => {
  expect(chi2PerDof({ chi2: 50, dof: 40 })).toBe(1.25);
  expect(chi2PerDof({ chi2: 0, dof: 0 })).toBeNull();
  expect(isDone(undefined)).toBe(false);
});

test('the circle that stands for an ellipse lies between its semi-axes, and is the circle itself for a round one', () => {
  expect(roundRadius(2, 1)).toBeCloseTo(2, 12);
  expect(roundRadius(2, undefined)).toBe(2);
  expect(roundRadius(2, 0.8)).toBeLessThan(2);
  expect(roundRadius(2, 0.8)).toBeGreaterThan(1.6);
});

test('a mark lies off the model ring of its channel by its residual; one that was set aside is no point', () => {
  const mark = (velocity: number) => ({ velocity });
  const frozen = { cubeId: 'c', channelWidth: 1, marks: [mark(-45), mark(-45), mark(-44)] } as never;
  expect(markPoints(fit, frozen)).toEqual([
    { velocity: -45, radius: 1.91 },
    { velocity: -44, radius: 2.1 },
  ]);
});
