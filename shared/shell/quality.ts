import type { ErrorModel } from '@/shared/shell/errorModel';
import type { ShellProblem, ShellState } from '@/shared/shell/gaussNewton';
import { informationCriteria } from '@/shared/shell/information';
import { finite } from '@/shared/shell/intervals';
import { priorChi2 } from '@/shared/shell/known';
import { naturalValues } from '@/shared/shell/naturalParameters';
import { EXTRA_1, EXTRA_2 } from '@/shared/shell/shellModel';
import { upperF } from '@/shared/shell/studentT';

export interface Quality {
  chi2: number;
  dof: number;
  aicc: number | null;
  bic: number | null;
}

/** How well a solution describes its marks. Every prior counts as one datum; a held parameter is not free. */
export function qualityOf(
  { model, marks, known }: ShellProblem,
  state: ShellState,
  errors: ErrorModel,
): Quality {
  const { residual, variance } = errors.evaluation;
  let chi2 = priorChi2(known, naturalValues(model, state));
  for (let i = 0; i < marks.count; i++) chi2 += residual[i]! ** 2 / variance[i]!;
  const free = state.p.length - known.filter((k) => k.fixed !== null).length;
  const dof = marks.count - free + known.filter((k) => k.prior !== null).length;
  const { aicc, bic } = informationCriteria(chi2, variance, free);
  return { chi2, dof, aicc: finite(aicc), bic: finite(bic) };
}

/**
 * How far a model's two extra parameters lie from the sphere's zeros (Wald's test): their squared distance in units of
 * the channel-aware covariance, against Fisher's F. This decides between models; the information criteria take marks
 * as independent and favour the richer model where channels share errors.
 *
 * @returns null where the model has no extra parameters, or one of them is held
 */
export function waldTest(
  p: Float64Array,
  { covariance, tDof }: ErrorModel,
): { f: number; probability: number; dof: number } | null {
  const size = p.length;
  if (size <= EXTRA_1) return null;
  const V = (a: number, b: number) => covariance[a * size + b]!;
  const [x, y] = [p[EXTRA_1]!, p[EXTRA_2]!];
  const [xx, xy, yy] = [V(EXTRA_1, EXTRA_1), V(EXTRA_1, EXTRA_2), V(EXTRA_2, EXTRA_2)];
  const determinant = xx * yy - xy * xy;
  if (!(determinant > 1e-12 * xx * yy)) return null;
  const f = (x * x * yy - 2 * x * y * xy + y * y * xx) / determinant / 2;
  const dof = Math.min(tDof[EXTRA_1]!, tDof[EXTRA_2]!);
  return { f, probability: upperF(f, 2, dof), dof };
}
