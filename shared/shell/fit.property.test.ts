import fc from 'fast-check';
import { destination, lonLatOf, separation, unitVector, type LonLat } from '@/shared/sky/greatCircle';
import { modelRadius } from '@/shared/shell/channelCurve';
import { fitShell, liveFit } from '@/shared/shell/fit';
import type { FitInput, SkyMark } from '@/shared/shell/fitInput';

interface Truth {
  centre: LonLat;
  theta: number;
  vSys: number;
  vExp: number;
}

const WIDTH_SHARE = 0.07; // channel width in units of v_exp

/** Marks of a shell, moved along their radius by `noise` times their sigma. */
function marksOf(shell: Truth, sigmaShare: number, noise: (i: number) => number, perChannel = 8): FitInput {
  const channelWidth = WIDTH_SHARE * shell.vExp;
  const marks: SkyMark[] = [];
  for (const u of [-0.85, -0.6, -0.3, 0.05, 0.35, 0.6, 0.85]) {
    const velocity = shell.vSys + u * shell.vExp;
    const radius = modelRadius(velocity, channelWidth, shell)!;
    for (let i = 0; i < perChannel; i++) {
      const sigma = sigmaShare * shell.theta;
      const off = noise(marks.length) * sigma;
      const at = destination(shell.centre, 360 * (i / perChannel) + 40 * u, radius + off);
      marks.push({ l: at.lon, b: at.lat, velocity, sigma });
    }
  }
  return { marks, channelWidth };
}

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const anywhere = fc.oneof(
  fc.record({ lon: number(0, 360), lat: number(-90, 90) }),
  fc.record({ lon: fc.constantFrom(0, 359.99999, 1e-7, 180), lat: number(-85, 85) }),
  fc.record({ lon: number(0, 360), lat: fc.constantFrom(90, -90, 89.99, 0) }),
);
const shells: fc.Arbitrary<Truth> = fc.record({
  centre: anywhere,
  theta: fc.oneof(number(0.05, 1), number(1, 40)),
  vSys: number(-200, 200),
  vExp: number(4, 60),
});
const centreOf = (fit: { parameters: Record<string, { value: number }> }): LonLat => ({
  lon: fit.parameters.l!.value,
  lat: fit.parameters.b!.value,
});

/** Repeatable noise: an incommensurate sequence, roughly uniform in +-1.7. */
const wiggle = (i: number) => 3.4 * (((i + 1) * 0.6180339887498949) % 1) - 1.7;

test('marks without noise give the shell back, small and large, at the poles and across longitude 0', () => {
  fc.assert(
    fc.property(shells, (shell) => {
      const fit = fitShell(marksOf(shell, 0.03, () => 0));
      expect(separation(centreOf(fit), shell.centre)).toBeLessThan(1e-8);
      expect(Math.abs(fit.parameters.theta!.value - shell.theta)).toBeLessThan(1e-8);
      expect(Math.abs(fit.parameters.vSys!.value - shell.vSys)).toBeLessThan(1e-8 * shell.vExp);
      expect(Math.abs(fit.parameters.vExp!.value / shell.vExp - 1)).toBeLessThan(1e-8);
      expect(fit.extra.setAside).toEqual([]);
    }),
    { numRuns: 120 },
  );
});

test('turning the sky turns the answer and changes nothing else', () => {
  fc.assert(
    fc.property(shells, anywhere, number(0, 360), (shell, pole, spin) => {
      const turn = (p: LonLat): LonLat => {
        const tilt = { lon: p.lon + spin, lat: p.lat };
        const [distance, angle] = [90 - tilt.lat, tilt.lon];
        return destination(pole, angle, distance);
      };
      const input = marksOf(shell, 0.03, wiggle);
      const turned = {
        ...input,
        marks: input.marks.map((m) => {
          const { lon, lat } = turn({ lon: m.l, lat: m.b });
          return { ...m, l: lon, b: lat };
        }),
      };
      const [a, b] = [liveFit(input), liveFit(turned)];
      expect(separation(turn(centreOf(a)), centreOf(b))).toBeLessThan(1e-6 * shell.theta);
      for (const name of ['theta', 'vSys', 'vExp']) {
        const [p, q] = [a.parameters[name]!, b.parameters[name]!];
        expect(Math.abs(p.value - q.value)).toBeLessThan(1e-4 * p.se!);
        expect(Math.abs(p.se! / q.se! - 1)).toBeLessThan(1e-4);
      }
      expect(b.chi2).toBeCloseTo(a.chi2, 5);
    }),
    { numRuns: 60 },
  );
});

test('stretching and shifting the velocities stretches and shifts v_sys and v_exp', () => {
  fc.assert(
    fc.property(shells, number(0.1, 10), number(-300, 300), (shell, factor, shift) => {
      const input = marksOf(shell, 0.03, wiggle);
      const moved = {
        channelWidth: input.channelWidth * factor,
        marks: input.marks.map((m) => ({ ...m, velocity: shift + factor * m.velocity })),
      };
      const [a, b] = [liveFit(input), liveFit(moved)];
      const off = (name: string, expected: number, unit: number) =>
        expect(Math.abs(b.parameters[name]!.value - expected)).toBeLessThan(
          1e-4 * unit * a.parameters[name]!.se!,
        );
      off('theta', a.parameters.theta!.value, 1);
      off('vSys', shift + factor * a.parameters.vSys!.value, factor);
      off('vExp', factor * a.parameters.vExp!.value, factor);
      expect(b.parameters.vExp!.se! / a.parameters.vExp!.se! / factor).toBeCloseTo(1, 3);
    }),
    { numRuns: 60 },
  );
});

test('the order of the marks does not matter', () => {
  const input = marksOf({ centre: { lon: 120, lat: -5 }, theta: 2, vSys: -40, vExp: 15 }, 0.03, wiggle);
  const first = fitShell(input);
  fc.assert(
    fc.property(
      fc.shuffledSubarray(
        input.marks.map((_, i) => i),
        { minLength: input.marks.length },
      ),
      (order) => {
        const fit = fitShell({ ...input, marks: order.map((i) => input.marks[i]!) });
        for (const [name, p] of Object.entries(first.parameters)) {
          expect(Math.abs(fit.parameters[name]!.value - p.value)).toBeLessThan(1e-5 * p.se!);
          expect(fit.parameters[name]!.se! / p.se!).toBeCloseTo(1, 6);
        }
        expect(fit.residuals[0]!.degrees).toBeCloseTo(first.residuals[order[0]!]!.degrees, 7);
      },
    ),
    { numRuns: 20 },
  );
});

test('the mirror image of the marks has the mirror image of the shell', () => {
  fc.assert(
    fc.property(shells, (shell) => {
      const input = marksOf(shell, 0.03, wiggle);
      const mirrored = {
        ...input,
        marks: input.marks.map((m) => ({ ...m, b: -m.b, velocity: -m.velocity })),
      };
      const [a, b] = [liveFit(input), liveFit(mirrored)];
      const centre = centreOf(a);
      expect(separation({ lon: centre.lon, lat: -centre.lat }, centreOf(b))).toBeLessThan(1e-6 * shell.theta);
      const unit = 1e-4 * a.parameters.vSys!.se!;
      expect(Math.abs(a.parameters.vSys!.value + b.parameters.vSys!.value)).toBeLessThan(unit);
      expect(Math.abs(a.parameters.vExp!.value - b.parameters.vExp!.value)).toBeLessThan(unit);
    }),
    { numRuns: 40 },
  );
});

test('the other models give their shells back from marks without noise', () => {
  const shell = { centre: { lon: 77, lat: 33 }, theta: 3, vSys: 10, vExp: 20 };
  const sphere = marksOf(shell, 0.03, () => 0);
  const [driftL, driftB] = [0.02, -0.03];
  const drifting = {
    ...sphere,
    marks: sphere.marks.map((m, i) => {
      const radians = (m.velocity - shell.vSys) * (Math.PI / 180);
      const n = unitVector(shell.centre);
      const e = unitVector({ lon: 167, lat: 0 });
      const north = unitVector({ lon: 77, lat: 123 });
      const centre = lonLatOf(
        [0, 1, 2].map((a) => n[a]! + radians * (driftL * e[a]! + driftB * north[a]!)) as never,
      );
      const at = destination(centre, 31 * i, modelRadius(m.velocity, sphere.channelWidth, shell)!);
      return { ...m, l: at.lon, b: at.lat };
    }),
  };
  const drift = fitShell(drifting, { model: 'drifting' }).parameters;
  expect(drift.driftL!.value).toBeCloseTo(driftL, 8);
  expect(drift.driftB!.value).toBeCloseTo(driftB, 8);
  expect(drift.l!.value).toBeCloseTo(77, 7);

  const [e, angle] = [0.3, 128];
  const flattened = {
    ...sphere,
    marks: sphere.marks.map((m, i) => {
      const psi = 31 * i;
      const round = Math.sin((modelRadius(m.velocity, sphere.channelWidth, shell)! * Math.PI) / 180);
      const radius = Math.asin(round / Math.sqrt(1 - e * Math.cos((2 * (psi - angle) * Math.PI) / 180)));
      const at = destination(shell.centre, psi, (radius * 180) / Math.PI);
      return { ...m, l: at.lon, b: at.lat };
    }),
  };
  const ellipse = fitShell(flattened, { model: 'elliptical' }).parameters;
  expect(ellipse.axisRatio!.value).toBeCloseTo(Math.sqrt(0.7 / 1.3), 8);
  expect(ellipse.positionAngle!.value).toBeCloseTo(angle, 6);

  const held = fitShell({ ...sphere, vSys: { value: 10 } }, { model: 'cap' });
  expect(held.parameters.vSys).toEqual({
    ...{ value: 10, se: 0, lo: 10, hi: 10, unit: 'km/s' },
    constraint: { fixed: 10 },
  });
  expect(held.parameters.vExp!.value).toBeCloseTo(20, 7);
  expect(held.dof).toBe(sphere.marks.length - 4);
});

test('marks without sigma take it from their scatter', () => {
  const shell = { centre: { lon: 10, lat: 20 }, theta: 2, vSys: 0, vExp: 15 };
  const { channelWidth, marks } = marksOf(shell, 0.03, wiggle);
  const stated = fitShell({ channelWidth, marks });
  const free = fitShell({ channelWidth, marks: marks.map(({ l, b, velocity }) => ({ l, b, velocity })) });
  expect(free.extra.sigmaUsedDeg / (0.06 * Math.sqrt(stated.extra.scales.mark))).toBeCloseTo(1, 1);
  expect(free.parameters.theta!.se! / stated.parameters.theta!.se!).toBeCloseTo(1, 1);
});

test('a mark far off its ring is set aside, named, and changes the answer little', () => {
  const shell = { centre: { lon: 10, lat: 20 }, theta: 2, vSys: 0, vExp: 15 };
  const input = marksOf(shell, 0.03, wiggle);
  const spoilt = {
    ...input,
    marks: input.marks.map((m, i) => (i === 17 ? { ...m, b: m.b + 0.9 } : m)),
  };
  const [clean, fit] = [fitShell(input), fitShell(spoilt)];
  expect(fit.extra.setAside).toEqual([17]);
  expect(fit.residuals[17]!.weight).toBe(0);
  expect(fit.warnings.map((w) => w.code)).toEqual(['outliers']);
  expect(fit.dof).toBe(input.marks.length - 6);
  const off = Math.abs(fit.parameters.theta!.value - clean.parameters.theta!.value);
  expect(off).toBeLessThan(clean.parameters.theta!.se!);
  const kept = fitShell(spoilt, { setAside: false });
  expect(kept.extra.setAside).toEqual([]);
  expect(kept.chi2).toBeGreaterThan(3 * fit.chi2);
});
