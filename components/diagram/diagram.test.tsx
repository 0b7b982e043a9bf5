import {
  curveVelocities,
  diagramLayout,
  domainOf,
  type DiagramRing,
} from '@/components/diagram/diagramScale';
import { radiusErrorOf } from '@/components/diagram/modelError';
import { ringRadius } from '@/shared/shell/ring';

const ring = (velocity: number, theta: number, se: number | null = 0.1): DiagramRing => ({
  channel: 0,
  velocity,
  theta,
  se,
  marks: 5,
});
const model = { theta: 2.6, vSys: -36, vExp: 28 };

describe('axes', () => {
  test('hold every ring with its error, and the model', () => {
    const domain = domainOf([{ rings: [ring(-58, 1.6), ring(-40, 2.9, 0.4)], model }], () => 0.05);
    expect(domain.velocity[0]).toBeLessThan(-64);
    expect(domain.velocity[1]).toBeGreaterThan(-8);
    expect(domain.radius).toBeGreaterThan(3.3);
    expect(domain.residual).toBeGreaterThan(0.45);
  });
  test('an expansion velocity without bound does not squeeze the rings', () => {
    const domain = domainOf(
      [{ rings: [ring(-40, 2), ring(-30, 2.1)], model: { ...model, vExp: 900 } }],
      () => null,
    );
    expect(domain.velocity[1] - domain.velocity[0]).toBeLessThan(60);
  });
  test('no data still makes axes', () => {
    const l = diagramLayout(
      domainOf([{ rings: [], model: null }], () => null),
      300,
      200,
      false,
    );
    for (const n of [l.x(0), l.y(0)]) expect(Number.isFinite(n)).toBe(true);
  });
  test('larger radii lie higher, residuals lie in their own panel below', () => {
    const l = diagramLayout({ velocity: [-70, 0], radius: 3, residual: 0.2 }, 340, 300, true);
    expect([l.x(-70), l.x(0), l.y(0)]).toEqual([l.left, l.right, l.floor]);
    expect(l.y(3)).toBe(l.top);
    expect(l.yResidual(0.2)).toBeCloseTo(l.residualTop, 6);
    expect(l.yResidual(-0.2)).toBeCloseTo(l.residualFloor, 6);
    expect(l.residualTop).toBeGreaterThan(l.floor);
  });
  test('the curve runs from cap to cap, dense where it is steep', () => {
    const v = curveVelocities(model);
    expect([v[0], v[v.length - 1]]).toEqual([-64, -8]);
    expect(v[1]! - v[0]!).toBeLessThan((v[48]! - v[47]!) / 10);
  });
});

describe('the error of the radius', () => {
  const p = (value: number, se: number | null) => ({ value, se });
  const names = ['l', 'b', 'theta', 'vSys', 'vExp'];
  const matrix = names.map((_, i) => names.map((__, j) => (i === j ? 1 : 0)));
  const fit = {
    parameters: { theta: p(2.6, 0.05), vSys: p(-36, 0.5), vExp: p(28, 1) },
    correlation: { names, matrix },
  };
  test('at the systemic velocity it is that of Θ, since the curve is level there', () => {
    expect(radiusErrorOf(fit)!(-36)).toBeCloseTo(0.05, 5);
  });
  test('elsewhere it agrees with moving the parameters one by one', () => {
    const at = (theta: number, vSys: number, vExp: number) => ringRadius(-55, { theta, vSys, vExp })!;
    const squares = [
      (at(2.65, -36, 28) - at(2.55, -36, 28)) / 2,
      (at(2.6, -35.5, 28) - at(2.6, -36.5, 28)) / 2,
      (at(2.6, -36, 29) - at(2.6, -36, 27)) / 2,
    ].map((d) => d * d);
    const expected = Math.sqrt(squares.reduce((a, b) => a + b));
    expect(radiusErrorOf(fit)!(-55) / expected).toBeCloseTo(1, 2);
  });
  test('a correlation that cancels makes it smaller; a number that is not known, null', () => {
    const tied = matrix.map((row, i) =>
      row.map((c, j) => (i !== j && i > 1 && j > 1 && i + j === 5 ? -0.9 : c)),
    );
    const less = radiusErrorOf({ ...fit, correlation: { names, matrix: tied } })!;
    const more = radiusErrorOf({
      ...fit,
      correlation: { names, matrix: tied.map((r, i) => r.map((c, j) => (i !== j ? -c : c))) },
    })!;
    expect(Math.min(less(-55), more(-55))).toBeLessThan(radiusErrorOf(fit)!(-55));
    expect(radiusErrorOf({ ...fit, parameters: { ...fit.parameters, vExp: p(28, null) } })).toBeNull();
  });
  test('at a cap, where the slope is infinite, it stays finite', () => {
    expect(radiusErrorOf(fit)!(-64)).toBeLessThan(3);
    expect(radiusErrorOf(fit)!(-64)).toBeGreaterThanOrEqual(0);
  });
});
