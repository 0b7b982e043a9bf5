import { errorModel } from '@/shared/shell/errorModel';
import { leaveOneOut, meanScore } from '@/shared/shell/extras/leaveOneOut';
import type { ComparedModel, Parameter } from '@/shared/shell/fitResult';
import { solveAndRecentre, type Outcome, type ShellProblem } from '@/shared/shell/gaussNewton';
import { report } from '@/shared/shell/intervals';
import { intoKnown } from '@/shared/shell/known';
import { qualityOf, waldTest } from '@/shared/shell/quality';
import { LN_W, parameterCount, type ModelName } from '@/shared/shell/shellModel';
import type { Solved } from '@/shared/shell/solveShell';

/** Wald's test passes below this probability. */
const SUPPORTED = 0.05;

/**
 * The marks of a fit, those set aside left out, under the round, the drifting and the elliptical shell, each with what
 * is known of the parameters that it has. A cap stands for the sphere where the fit is one. Wald's test of a model's
 * two extra parameters decides; the criteria and the leave-one-out scores are for looking.
 */
export function compareModels(solved: Solved): { models: ComparedModel[] } {
  const own = solved.problem.model;
  const names: ModelName[] = [own === 'cap' ? 'cap' : 'sphere', 'drifting', 'elliptical'];
  return { models: names.map((model) => compared(model, solved)) };
}

function compared(model: ModelName, solved: Solved): ComparedModel {
  const size = parameterCount(model);
  const { marks } = solved.problem;
  const without = (problem: string): ComparedModel => ({
    ...{
      model,
      chi2: null,
      dof: null,
      aicc: null,
      bic: null,
      leaveOneOut: null,
      wald: null,
      parameters: null,
    },
    problem,
    sentence: `${capital(WORD[model])} could not be fitted. ${problem}`,
  });
  if (marks.count < size + 1)
    return without(`There are ${marks.count} marks; this model needs at least ${size + 1}.`);
  const { problem, outcome } = model === solved.problem.model ? solved : refitted(model, solved);
  const errors = outcome.p.every(Number.isFinite) ? errorModel(problem, outcome) : null;
  if (errors === null || !outcome.settled || outcome.reason === 'no-progress')
    return without('The fit does not settle on these marks.');
  const { parameters } = report(model, outcome, errors, problem.known);
  const wald = waldTest(outcome.p, errors);
  return {
    model,
    ...qualityOf(problem, outcome, errors),
    leaveOneOut: meanScore(leaveOneOut(problem, outcome, errors, parameters)),
    wald,
    parameters: model === 'elliptical' && !passes(wald) ? withoutEllipse(parameters) : parameters,
    sentence: sentenceOf(model, wald, parameters),
  };
}

/** Another model on the same marks, from the fitted values. */
function refitted(
  model: ModelName,
  { problem, outcome }: Solved,
): { problem: ShellProblem; outcome: Outcome } {
  const size = parameterCount(model);
  const known = problem.known.filter((k) => k.index <= LN_W);
  const other = { model, marks: problem.marks, known };
  const p = new Float64Array(size);
  p.set(outcome.p.subarray(0, LN_W + 1));
  intoKnown(model, known, outcome.frame, p);
  return { problem: other, outcome: solveAndRecentre(other, { frame: outcome.frame, p }) };
}

const WORD: Record<ModelName, string> = {
  sphere: 'a sphere',
  cap: 'a cap',
  drifting: 'a drifting sphere',
  elliptical: 'an elliptical sphere',
};

type Wald = ComparedModel['wald'];
const passes = (wald: Wald) => wald !== null && wald.probability < SUPPORTED;

/** The ratio of an ellipse that is not there comes out below one by noise alone: it is not shown. */
function withoutEllipse({ axisRatio: _, positionAngle: __, ...rest }: Record<string, Parameter>) {
  return rest;
}

function sentenceOf(model: ModelName, wald: Wald, parameters: Record<string, Parameter>): string {
  if (model === 'sphere' || model === 'cap')
    return `${capital(WORD[model])} is the simplest of these shells; the others are judged by what they add to it.`;
  const what = model === 'drifting' ? 'a drift' : 'an ellipse';
  if (wald === null) return `Whether the marks support ${what} cannot be told while its parameters are held.`;
  const p = wald.probability < 0.001 ? 'p < 0.001' : `p = ${wald.probability.toPrecision(2)}`;
  if (!passes(wald)) return `The marks do not support ${what} (${p}).`;
  if (model === 'elliptical')
    return `The marks support an ellipse of axis ratio ${parameters.axisRatio!.value.toFixed(2)} (${p}).`;
  const rate = Math.hypot(parameters.driftL!.value, parameters.driftB!.value);
  return `The marks support a drift of ${rate.toPrecision(2)} degrees per km/s (${p}).`;
}

const capital = (text: string) => text[0]!.toUpperCase() + text.slice(1);
