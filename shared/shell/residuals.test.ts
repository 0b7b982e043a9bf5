import fc from 'fast-check';
import { destination, unitVector } from '@/shared/sky/greatCircle';
import { channelCurve, curveTable, modelRadius } from '@/shared/shell/channelCurve';
import { evaluation, frameAt } from '@/shared/shell/frame';
import type { MarkSet } from '@/shared/shell/markSet';
import { evaluate } from '@/shared/shell/residuals';
import { parameterCount, type ModelName } from '@/shared/shell/shellModel';

/** Eighth-order central difference. */
function derivative(f: (x: number) => number, x: number, h: number): number {
  const c = [4 / 5, -1 / 5, 4 / 105, -1 / 280];
  return c.reduce((sum, w, i) => sum + w * (f(x + (i + 1) * h) - f(x - (i + 1) * h)), 0) / h;
}

const curveAt = (v: number, dv: number, theta: number, v0: number, w: number) => {
  const out = curveTable(1);
  channelCurve(v, dv, theta, v0, w, out, 0);
  return {
    radius: out.radius[0]!,
    variance: out.variance[0]!,
    d: [out.dTheta[0]!, out.dV0[0]!, out.dLnW[0]!],
  };
};

describe('the ring radius of a channel', () => {
  const shell = {
    theta: fc.double({ min: 0.001, max: 0.8, noNaN: true }),
    w: fc.double({ min: 3, max: 60, noNaN: true }),
    u: fc.double({ min: -1.1, max: 1.1, noNaN: true }),
    share: fc.double({ min: 0.001, max: 1.2, noNaN: true }),
  };

  test('is the mean over the visible part of the channel, with its variance', () => {
    fc.assert(
      fc.property(shell.theta, shell.w, shell.u, shell.share, (theta, w, u, share) => {
        const [low, high] = [Math.max(u - share / 2, -1), Math.min(u + share / 2, 1)];
        fc.pre(high - low > 0.11 * share && high - low > 0.001);
        const n = 20000; // midpoints in psi, where the integrand is smooth up to the cap
        const [pa, pb] = [Math.asin(low), Math.asin(high)];
        let [mean, square] = [0, 0];
        for (let i = 0; i < n; i++) {
          const c = Math.cos(pa + ((pb - pa) * (i + 0.5)) / n);
          mean += (c * c * (pb - pa)) / n / (high - low);
          square += (c * c * c * (pb - pa)) / n / (high - low);
        }
        const found = curveAt(-7 + u * w, share * w, theta, -7, w);
        const expected = Math.asin(Math.sin(theta) * mean);
        expect(Math.abs(found.radius / expected - 1)).toBeLessThan(1e-8);
        const variance = (Math.sin(theta) ** 2 * (square - mean * mean)) / Math.cos(expected) ** 2;
        expect(Math.abs(found.variance - variance)).toBeLessThan(1e-7 * theta * theta);
      }),
      { numRuns: 40 },
    );
  });

  test('has the derivatives it says, beyond the caps too', () => {
    fc.assert(
      fc.property(shell.theta, shell.w, shell.u, shell.share, (theta, w, u, share) => {
        const v = 12 + u * w;
        const dv = share * w;
        const kinks = [1 - u - share / 2, 1 - u + share / 2, 1 + u - share / 2, 1 + u + share / 2, u];
        const narrow = Math.min(0.1 * share, 0.2);
        kinks.push(...[1 - (u - share / 2) - narrow, 1 + (u + share / 2) - narrow, share - 2]);
        fc.pre(kinks.every((k) => Math.abs(k) > 0.02));
        const { d, radius } = curveAt(v, dv, theta, 12, w);
        fc.pre(Math.abs(radius) < 0.9); // further out a trial step is held at the horizon
        const numeric = [
          derivative((x) => curveAt(v, dv, x, 12, w).radius, theta, 1e-3 * theta),
          derivative((x) => curveAt(v, dv, theta, x, w).radius, 12, 2e-3 * w),
          derivative((x) => curveAt(v, dv, theta, 12, Math.exp(x)).radius, Math.log(w), 2e-3),
        ];
        const scale = [1, theta / w, theta];
        d.forEach((value, i) =>
          expect(Math.abs(value - numeric[i]!)).toBeLessThan(2e-6 * (scale[i]! + Math.abs(value))),
        );
      }),
      { numRuns: 300 },
    );
  });

  test('is continuous where the tangent takes over, and falls on past the cap', () => {
    const [theta, w, dv] = [0.03, 15, 1];
    const edge = w + dv / 2 - 0.1 * dv; // where a tenth of the channel is left
    const [inside, outside] = [curveAt(edge - 1e-9, dv, theta, 0, w), curveAt(edge + 1e-9, dv, theta, 0, w)];
    expect(Math.abs(inside.radius - outside.radius)).toBeLessThan(1e-9);
    expect(curveAt(w + 3, dv, theta, 0, w).radius).toBeLessThan(0);
    expect(curveAt(w + 4, dv, theta, 0, w).radius).toBeLessThan(curveAt(w + 3, dv, theta, 0, w).radius);
  });

  test('a channel of no width shows the plain radius', () => {
    const { radius } = curveAt(4, 1e-9, 0.2, 0, 10);
    expect(radius).toBeCloseTo(Math.asin(Math.sin(0.2) * Math.sqrt(1 - 0.16)), 12);
    expect(modelRadius(4, 1e-9, { theta: 10, vSys: 0, vExp: 10 })).toBeCloseTo(
      (Math.asin(Math.sin(Math.PI / 18) * Math.sqrt(0.84)) * 180) / Math.PI,
      10,
    );
    expect(modelRadius(11, 1, { theta: 10, vSys: 0, vExp: 10 })).toBeNull();
    expect(modelRadius(10.4, 1, { theta: 10, vSys: 0, vExp: 10 })).toBeGreaterThan(0);
  });
});

describe('residuals of the marks', () => {
  const models: ModelName[] = ['sphere', 'cap', 'drifting', 'elliptical'];
  const centre = { lon: 359, lat: 71 };

  function marksAround(theta: number): MarkSet {
    const velocity = Float64Array.of(-14, -9, -3, 4, 12);
    const points = Array.from({ length: 20 }, (_, i) =>
      destination(centre, 17 * i, theta * (0.6 + 0.02 * i)),
    );
    return {
      count: 20,
      channels: 5,
      direction: Float64Array.from(points.flatMap((p) => [...unitVector(p)])),
      sigma2: Float64Array.from(points, (_, i) => (0.02 * theta * (1 + i / 20) * (Math.PI / 180)) ** 2),
      channel: Int32Array.from(points, (_, i) => i % 5),
      velocity,
      width: 1.3,
      block: Int32Array.from(points, (_, i) => i % 5),
      blocks: 5,
      unseen: null,
      drawn: 0,
    };
  }

  test.each(models)('have the derivatives they say: %s', (model) => {
    for (const theta of [0.05, 2, 25]) {
      const marks = marksAround(theta);
      const radians = (theta * Math.PI) / 180;
      const extra = model === 'drifting' ? [0.01 * radians, -0.02 * radians] : [0.2, -0.1];
      const p = Float64Array.from([
        0.1 * radians,
        -0.07 * radians,
        radians,
        -1,
        Math.log(17),
        ...extra,
      ]).slice(0, parameterCount(model));
      const frame = frameAt(marks, unitVector(centre));
      const out = evaluation(marks, p.length);
      const h = [1e-3 * radians, 1e-3 * radians, 1e-3 * radians, 0.02, 1e-3, 1e-3, 1e-3];
      if (model === 'drifting') h[5] = h[6] = 1e-3 * radians;
      evaluate(model, marks, frame, p, out);
      const analytic = Float64Array.from(out.jacobian);
      for (let i = 0; i < marks.count; i++)
        for (let a = 0; a < p.length; a++) {
          const residual = (x: number) => {
            const moved = Float64Array.from(p);
            moved[a] = x;
            evaluate(model, marks, frame, moved, out);
            return out.residual[i]!;
          };
          const numeric = derivative(residual, p[a]!, h[a]!);
          const scale = radians / (h[a]! * 1e3); // a residual changes by about theta over this range
          expect(Math.abs(analytic[i * p.length + a]! - numeric)).toBeLessThan(1e-8 * scale);
        }
    }
  });
});
