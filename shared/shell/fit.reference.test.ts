import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fitShell, liveFit } from '@/shared/shell/fit';
import type { FitInput } from '@/shared/shell/fitInput';
import type { FitResult } from '@/shared/shell/fitResult';
import type { ModelName } from '@/shared/shell/shellModel';

interface ReferenceFit extends Omit<FitResult, 'model' | 'extra'> {
  model: ModelName;
  reference: {
    leastSquares: { se: Record<string, number> };
    channelAware: {
      covariance: number[][];
      tDof: Record<string, number>;
      scales: Record<'mark' | 'spread' | 'ringDeg' | 'shiftDeg', number>;
    };
    seLnVExp: number;
    setAside: number[];
    arcDeg: number;
    riseSigma: number;
    channels: number;
  };
}

const folder = join(__dirname, '../../tests/reference/shells');
const load = (path: string) => JSON.parse(readFileSync(join(folder, path), 'utf8'));
const cases: [string, string, string][] = [
  ...[
    '01-full-8x10',
    '02-few-4x6',
    '03-arc-120',
    '04-cap-near-prior',
    '05-large-15deg',
    '06-small-5-beams',
    '07-outliers',
    '08-ring-bias',
    '09-vexp-unconstrained',
    '10-one-sided',
    '11-drifting',
    '12-elliptical',
  ].map((name): [string, string, string] => [name, `cases/${name}.json`, `cases/${name}.fit.json`]),
  ...['alder', 'birch', 'cedar'].map((name): [string, string, string] => [
    name,
    `cubes/${name}.sky-marks.json`,
    `cubes/${name}.fit.json`,
  ]),
];

const relative = (mine: number, theirs: number) => Math.abs(mine / theirs - 1);

describe.each(cases)('%s', (_name, marksPath, fitPath) => {
  const input: FitInput = load(marksPath);
  const { fit: reference, tolerance } = load(fitPath) as {
    fit: ReferenceFit;
    tolerance: { values: number; se: number; chi2: number };
  };
  const record = fitShell(input, { model: reference.model });
  const live = liveFit(input, { model: reference.model });
  const names = Object.keys(reference.parameters);

  test.each([
    ['record', record],
    ['live', live],
  ])('values, %s', (_optimiser, fit) => {
    expect(Object.keys(fit.parameters)).toEqual(names);
    for (const name of names) {
      const off = Math.abs(fit.parameters[name]!.value - reference.parameters[name]!.value);
      expect(off).toBeLessThan(tolerance.values * reference.reference.leastSquares.se[name]!);
    }
    expect(relative(fit.chi2, reference.chi2)).toBeLessThan(tolerance.chi2);
    expect(fit.dof).toBe(reference.dof);
    expect(fit.extra.setAside).toEqual(reference.reference.setAside);
  });

  test('standard errors, intervals and covariance', () => {
    for (const name of names) {
      const [mine, theirs] = [record.parameters[name]!, reference.parameters[name]!];
      expect(relative(mine.se!, theirs.se!)).toBeLessThan(tolerance.se);
      expect(
        relative(record.extra.leastSquaresSe[name]!, reference.reference.leastSquares.se[name]!),
      ).toBeLessThan(tolerance.se);
      expect(relative(record.extra.tDof[name]!, reference.reference.channelAware.tDof[name]!)).toBeLessThan(
        1e-3,
      );
      for (const end of ['lo', 'hi'] as const) {
        if (theirs[end] === null) expect(mine[end]).toBeNull();
        else expect(Math.abs(mine[end]! - theirs[end]!)).toBeLessThan(1e-3 * theirs.se!);
      }
    }
    record.extra.covariance.forEach((row, a) =>
      row.forEach((value, b) => {
        const unit = reference.parameters[names[a]!]!.se! * reference.parameters[names[b]!]!.se!;
        expect(Math.abs(value! - reference.reference.channelAware.covariance[a]![b]!)).toBeLessThan(
          1e-3 * unit,
        );
        expect(
          Math.abs(record.correlation.matrix[a]![b]! - reference.correlation.matrix[a]![b]!),
        ).toBeLessThan(1e-3);
      }),
    );
    const { scales } = reference.reference.channelAware;
    for (const source of ['mark', 'spread', 'ringDeg', 'shiftDeg'] as const)
      expect(Math.abs(record.extra.scales[source] - scales[source])).toBeLessThanOrEqual(
        1e-4 * Math.abs(scales[source]),
      );
  });

  test('warnings, criteria, rings and residuals', () => {
    expect(record.warnings.map((w) => w.code)).toEqual(reference.warnings.map((w) => w.code));
    expect(live.warnings).toEqual(record.warnings);
    expect(Math.abs(record.aicc! - reference.aicc!)).toBeLessThan(1e-4);
    expect(Math.abs(record.bic! - reference.bic!)).toBeLessThan(1e-4);
    expect(relative(record.extra.seLnVExp!, reference.reference.seLnVExp)).toBeLessThan(1e-3);
    expect(record.extra.arcDeg).toBeCloseTo(reference.reference.arcDeg, 4);
    expect(record.extra.riseSigma).toBeCloseTo(reference.reference.riseSigma, 6);
    expect(record.extra.channels).toBe(reference.reference.channels);
    expect(record.rings).toHaveLength(reference.rings.length);
    reference.rings.forEach((theirs, k) => {
      const mine = record.rings[k]!;
      expect(mine.velocity).toBeCloseTo(theirs.velocity, 6);
      expect(mine.marks).toBe(theirs.marks);
      expect(relative(mine.model, theirs.model)).toBeLessThan(1e-6);
      if (theirs.theta === null) return expect(mine.theta).toBeNull();
      expect(relative(mine.theta!, theirs.theta)).toBeLessThan(1e-6);
      expect(relative(mine.se!, theirs.se!)).toBeLessThan(1e-3);
    });
    reference.residuals.forEach((theirs, i) => {
      expect(record.residuals[i]!.mark).toBe(theirs.mark);
      expect(record.residuals[i]!.weight).toBe(theirs.weight);
      expect(Math.abs(record.residuals[i]!.degrees - theirs.degrees)).toBeLessThan(
        1e-5 * record.extra.sigmaUsedDeg,
      );
    });
  });

  test('both optimisers end at the same point', () => {
    for (const name of names) {
      const off = Math.abs(live.parameters[name]!.value - record.parameters[name]!.value);
      expect(off).toBeLessThan(1e-5 * record.extra.leastSquaresSe[name]!);
    }
  });
});

test('an ellipse fitted as a sphere is called a poor fit, and by nothing else', () => {
  const fit = fitShell(load('cases/12-elliptical.json'), { model: 'sphere' });
  expect(relative(fit.chi2, 857.708)).toBeLessThan(1e-6);
  expect(fit.dof).toBe(91);
  expect(fit.parameters.theta!.value).toBeCloseTo(2.636623, 5);
  expect(fit.parameters.vExp!.value).toBeCloseTo(17.056379, 5);
  expect(fit.extra.setAside).toEqual([]);
  expect(fit.warnings.map((w) => w.code)).toEqual(['poor-fit']);
});
