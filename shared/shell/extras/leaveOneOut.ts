import type { ErrorModel } from '@/shared/shell/errorModel';
import { LEAST_CHANNELS, LEAST_MARKS } from '@/shared/shell/fitInput';
import type { LeftOut, Parameter } from '@/shared/shell/fitResult';
import { evaluation, frameAt } from '@/shared/shell/frame';
import { solveAndRecentre, type ShellProblem, type ShellState } from '@/shared/shell/gaussNewton';
import { allOf, subset } from '@/shared/shell/markSet';
import { naturalValues } from '@/shared/shell/naturalParameters';
import { evaluate } from '@/shared/shell/residuals';
import { PARAMETER_NAMES, parameterCount } from '@/shared/shell/shellModel';

const PERIOD: Record<string, number> = { l: 360, positionAngle: 180 };

/**
 * The fit without each channel in turn: how far every parameter moves, and the mean squared scaled residual of the
 * channel's marks under the fit that has not seen them (scaled by the variances of the whole fit).
 */
export function leaveOneOut(
  problem: ShellProblem,
  state: ShellState,
  errors: ErrorModel,
  parameters: Record<string, Pick<Parameter, 'se'>>,
): LeftOut[] {
  const { model, marks } = problem;
  const names = PARAMETER_NAMES[model];
  const fitted = naturalValues(model, state);
  const { variance } = errors.evaluation;
  return Array.from(marks.velocity, (velocity, k) => {
    const members = allOf(marks).filter((i) => marks.channel[i] === k);
    const without = (reason: string): LeftOut => ({
      ...{ velocity, marks: members.length, shift: {}, shiftInSe: {}, score: null },
      problem: reason,
    });
    if (marks.channels - 1 < LEAST_CHANNELS)
      return without(
        `Without this channel there are only ${marks.channels - 1}, and a fit needs ${LEAST_CHANNELS}.`,
      );
    const left = subset(marks, (i) => marks.channel[i] !== k);
    const needed = Math.max(LEAST_MARKS, parameterCount(model) + 1);
    if (left.count < needed)
      return without(
        `Without this channel there are only ${left.count} marks, and this model needs ${needed}.`,
      );
    const fit = solveAndRecentre(
      { ...problem, marks: left },
      { frame: frameAt(left, state.frame.origin), p: Float64Array.from(state.p) },
    );
    if (!fit.settled || fit.reason === 'no-progress' || !fit.p.every(Number.isFinite))
      return without('Without this channel the fit does not settle.');
    const values = naturalValues(model, fit);
    const shift: Record<string, number> = {};
    const shiftInSe: Record<string, number | null> = {};
    names.forEach((name, a) => {
      const period = PERIOD[name];
      const off = values[a]! - fitted[a]!;
      shift[name] = period === undefined ? off : off - period * Math.round(off / period);
      const { se } = parameters[name] ?? { se: null };
      shiftInSe[name] = se !== null && se > 0 ? shift[name] / se : null;
    });
    const unseen = subset(marks, (i) => marks.channel[i] === k);
    const at = evaluation(unseen, fit.p.length);
    evaluate(model, unseen, frameAt(unseen, fit.frame.origin), fit.p, at);
    const score =
      members.reduce((sum, i, m) => sum + at.residual[m]! ** 2 / variance[i]!, 0) / members.length;
    return { velocity, marks: members.length, shift, shiftInSe, score };
  });
}

/** Mean score of a mark over the channels; null where a channel has none. */
export function meanScore(left: readonly LeftOut[]): number | null {
  let [sum, marks] = [0, 0];
  for (const { score, marks: count } of left) {
    if (score === null) return null;
    sum += score * count;
    marks += count;
  }
  return marks > 0 ? sum / marks : null;
}
