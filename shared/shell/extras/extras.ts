import { compareModels } from '@/shared/shell/extras/compareModels';
import { leaveOneOut } from '@/shared/shell/extras/leaveOneOut';
import { profiles } from '@/shared/shell/extras/profiles';
import type { FitResult } from '@/shared/shell/fitResult';
import type { Solved } from '@/shared/shell/solveShell';

/** Above this many marks the refits would take a minute and tell what no one can see. */
const MOST_MARKS = 20_000;

/** A fit with what the fit of record says besides: profiles, the fit without each channel, other models. */
export function withExtras(fit: FitResult, solved: Solved): FitResult {
  const { problem, outcome, errors } = solved;
  if (problem.marks.count > MOST_MARKS) return fit;
  const extra = {
    ...fit.extra,
    profiles: profiles(solved, fit.parameters),
    leaveOneOut: leaveOneOut(problem, outcome, errors, fit.parameters),
    comparison: compareModels(solved),
  };
  return { ...fit, extra };
}
