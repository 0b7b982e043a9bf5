import { readingsApart } from '@/shared/shell/readingsApart';

const fit = (values: Record<string, [value: number, se: number | null]>) => ({
  parameters: Object.fromEntries(
    Object.entries({ l: [0.01, 0.01], b: [60, 0.01], vSys: [-40, 0.3], vExp: [15, 0.5], ...values }).map(
      ([name, [value, se]]) => [
        name,
        {
          value: value as number,
          se: se as number | null,
          lo: null,
          hi: null,
          unit: name.startsWith('v') ? 'km/s' : 'deg',
        },
      ],
    ),
  ),
});

test('half the squared difference of the radii, or a quarter for their mean, comes on top of the errors', () => {
  const apart = readingsApart(fit({ theta: [2, 0.03] }), fit({ theta: [2.1, 0.04] }));
  const theta = apart.parameters.find((p) => p.parameter === 'theta')!;
  expect(theta.difference).toBeCloseTo(0.1, 12);
  expect(theta.inErrors).toBeCloseTo(0.1 / 0.05, 9);
  expect(apart.thetaVariance.single).toBeCloseTo(0.005, 12);
  expect(apart.thetaVariance.mean).toBeCloseTo(0.0025, 12);
  expect(apart.thetaSe.first).toBeCloseTo(Math.sqrt(0.03 ** 2 + 0.005), 12);
  expect(apart.thetaSe.second).toBeCloseTo(Math.sqrt(0.04 ** 2 + 0.005), 12);
  expect(apart.thetaSe.mean).toBeCloseTo(Math.sqrt(0.025 ** 2 + 0.0025), 12);
  expect(apart.sentences[0]).toContain('Θ larger by 0.1 deg (2.0 combined errors)');
  expect(apart.sentences.at(-1)).toContain('Add 0.071 deg');
});

test('centres on both sides of longitude 0 are near each other', () => {
  const apart = readingsApart(fit({ theta: [2, 0.03] }), fit({ theta: [2, 0.03], l: [359.99, 0.01] }));
  const centre = apart.parameters.find((p) => p.parameter === 'centre')!;
  expect(centre.difference).toBeCloseTo(0.01, 4); // 0.02 degrees of longitude at b = 60
  expect(centre.inErrors).toBeCloseTo(0.02 / Math.hypot(0.01, 0.01) / Math.SQRT2, 3);
});

test.each([
  [2.05, 'They agree within their errors.'],
  [2.11, 'In Θ they differ by more than their errors allow'],
  [2.3, 'In Θ they differ by far more than their errors allow'],
])('a second radius of %d is put into words', (theta, words) => {
  const { sentences } = readingsApart(fit({ theta: [2, 0.03] }), fit({ theta: [theta, 0.03] }), [
    'the reading',
    'the traced rim',
  ]);
  expect(sentences[0]).toMatch(/^Compared with the reading, the traced rim has the centre/);
  expect(sentences[1]).toContain(words);
});

test('errors that are not known are not made up', () => {
  const apart = readingsApart(fit({ theta: [2, null] }), fit({ theta: [2.1, 0.03] }));
  expect(apart.parameters.find((p) => p.parameter === 'theta')!.inErrors).toBeNull();
  expect(apart.thetaSe).toMatchObject({ first: null, mean: null });
  expect(() => readingsApart(fit({}), fit({}))).toThrow(RangeError);
});
