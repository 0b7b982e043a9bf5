import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readMarks } from '@/shared/shell/fitInput';
import { evaluation, frameAt } from '@/shared/shell/frame';
import { solveAndRecentre, type ShellProblem } from '@/shared/shell/gaussNewton';
import { readConstraints } from '@/shared/shell/constraints';
import { errorModel } from '@/shared/shell/errorModel';
import { naturalValues } from '@/shared/shell/naturalParameters';
import { libraryRound, solveForRecord } from '@/shared/shell/recordFit';
import { parameterCount, type ModelName } from '@/shared/shell/shellModel';
import { startValues } from '@/shared/shell/start';
import { recentred } from '@/shared/shell/frame';

const folder = join(__dirname, '../../tests/reference/shells/cases');

/** From the linear start values, without the robust pass: each optimiser does all the work. */
describe.each<[string, ModelName]>([
  ['01-full-8x10', 'sphere'],
  ['04-cap-near-prior', 'cap'],
  ['05-large-15deg', 'sphere'],
  ['08-ring-bias', 'sphere'],
  ['10-one-sided', 'sphere'],
  ['11-drifting', 'drifting'],
  ['12-elliptical', 'elliptical'],
])('%s', (name, model) => {
  const input = JSON.parse(readFileSync(join(folder, `${name}.json`), 'utf8'));
  const marks = readMarks(input, model);
  const problem: ShellProblem = {
    model,
    marks,
    known: readConstraints(model, {}, model === 'cap' ? input.vSys : undefined),
  };
  const fresh = () => {
    const start = startValues(marks);
    const p = new Float64Array(parameterCount(model));
    p.set(start.p);
    return { frame: frameAt(marks, start.centre), p };
  };
  const gaussNewton = solveAndRecentre(problem, fresh());
  const errors = errorModel(problem, gaussNewton)!;
  const expected = naturalValues(model, gaussNewton);
  const size = expected.length;
  const worst = (found: Float64Array) => {
    const unit = Float64Array.from({ length: size }, (_, a) => Math.sqrt(errors.plain[a * size + a]!));
    const scale = [180 / Math.PI, 180 / Math.PI, 180 / Math.PI, 1, Math.exp(gaussNewton.p[4]!), 1, 1];
    if (model === 'drifting') scale[5] = scale[6] = 180 / Math.PI;
    if (model === 'elliptical') scale[6] = 180 / Math.PI;
    return Math.max(...found.map((value, a) => Math.abs(value - expected[a]!) / unit[a]! / scale[a]!));
  };

  test('the library alone comes to within a thousandth of an error', () => {
    const state = fresh();
    const at = evaluation(marks, size);
    let rounds = 0;
    while (rounds < 30 && libraryRound(problem, state, at) > 1e-5) rounds++;
    expect(rounds).toBeGreaterThan(0);
    expect(rounds).toBeLessThan(30);
    const frame = recentred(marks, state.frame, state.p);
    expect(worst(naturalValues(model, { frame, p: state.p }))).toBeLessThan(1e-3);
  });

  test('polished, the two agree to a hundred-thousandth', () => {
    const record = solveForRecord(problem, fresh());
    expect(record.settled).toBe(true);
    expect(worst(naturalValues(model, record))).toBeLessThan(1e-5);
  });
});
