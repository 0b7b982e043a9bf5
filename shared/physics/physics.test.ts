/** Against tests/reference/physics.json: numpy 1.24, mpmath 1.3 with CODATA 2018 constants; source of each formula there. */
import reference from '@/tests/reference/physics.json';
import { kinematicAge } from './age';
import { MEGAYEAR_S, PARSEC_KM } from './constants';
import { designation } from './designation';
import { linearRadius } from './size';

const rowsOf = (name: string) =>
  reference.formulas.find((f) => f.name === name)!.rows as {
    inputs: Record<string, number>;
    outputs: Record<string, number | null>;
  }[];
const close = (a: number, b: number, tolerance = 1e-12) =>
  expect(Math.abs(a - b)).toBeLessThanOrEqual(tolerance * Math.max(Math.abs(b), 1e-300));

test('the constants are the reference ones', () => {
  close(PARSEC_KM * 1e5, reference.constants.parsecCm);
  close(MEGAYEAR_S, reference.constants.megayearS);
});

test('R = D sin Θ agrees with the reference', () => {
  expect(rowsOf('linearSize').length).toBeGreaterThan(3);
  for (const { inputs, outputs } of rowsOf('linearSize'))
    close(
      linearRadius({ value: inputs.distancePc!, se: null }, { value: inputs.thetaDeg!, se: null }).value,
      outputs.radiusPc!,
    );
});

test('the kinematic age agrees for each factor, and there is none without expansion', () => {
  for (const { inputs, outputs } of rowsOf('kinematicAge'))
    for (const [factor, key] of [
      [1, 'dynamicalMyr'],
      [0.6, 'pressureDrivenMyr'],
      [0.25, 'snowploughMyr'],
    ] as const) {
      const age = kinematicAge(
        { value: inputs.radiusPc!, se: 0 },
        { value: inputs.velocityKms!, se: 0 },
        { factor },
      );
      if (outputs[key] === null) expect(age).toBeNull();
      else close(age!.value, outputs[key]!);
    }
});

test('first-order errors of radius and age agree, with and without correlation', () => {
  for (const { inputs: i, outputs } of rowsOf('errorsFirstOrder')) {
    const theta = { value: i.thetaDeg!, se: i.thetaSeDeg! };
    const distance = { value: i.distancePc!, se: i.distanceSePc! };
    const radius = linearRadius(distance, theta);
    close(radius.value, outputs.radiusPc!, 1e-9);
    close(radius.se, outputs.radiusSePc!, 1e-9);
    // only the part of R's error that comes from Θ goes with v_exp
    const fromTheta = linearRadius({ ...distance, se: 0 }, theta).se;
    const correlation = radius.se > 0 ? (i.correlationThetaVexp! * fromTheta) / radius.se : 0;
    const age = kinematicAge(radius, { value: i.vExpKms!, se: i.vExpSeKms! }, { correlation })!;
    close(age.value, outputs.ageMyr!, 1e-9);
    close(age.se, outputs.ageSeMyr!, 1e-9);
  }
});

test.each([
  [118.2, -3.1, -41.2, 'GSH 118-03-041'],
  [359.7, 0.4, 5.2, 'GSH 000+00+005'],
  [-0.2, -0.3, -0.4, 'GSH 000-00-000'],
  [7.4, 12.6, 120.7, 'GSH 007+13+121'],
])('l %d, b %d, v %d is %s', (l, b, v, name) => expect(designation(l, b, v)).toBe(name));
