import type { Fit, FitOutcome } from '@/shared/contract/fits';
import type { DiagramModel, DiagramRing } from '../diagram/diagramScale';
import { radiusErrorOf } from '../diagram/modelError';

export type DoneFit = Fit & FitOutcome;
/** A fit with its outcome; until it is done there is none. */
export const isDone = (fit: Fit | undefined): fit is DoneFit =>
  fit?.status === 'done' && fit.parameters !== undefined;

/** The model curve of a fit for the radius–velocity diagram; null for a fit without the three numbers of a sphere. */
export function modelOf(fit: FitOutcome): DiagramModel | null {
  const { theta, vSys, vExp } = fit.parameters;
  if (!theta || !vSys || !vExp) return null;
  const errorAt = radiusErrorOf(fit) ?? undefined;
  return { theta: theta.value, vSys: vSys.value, vExp: vExp.value, ...(errorAt && { errorAt }) };
}

/** The rings a fit found, as the diagram takes them. */
export const ringsOf = (fit: FitOutcome): DiagramRing[] =>
  fit.rings.flatMap(({ channel, velocity, theta, se, marks }) =>
    theta === null ? [] : [{ channel, velocity, theta, se, marks }],
  );

/** Residuals with the largest first; marks set aside keep their place by size. */
export const byLargest = (fit: FitOutcome): FitOutcome['residuals'] =>
  [...fit.residuals].sort((a, b) => Math.abs(b.degrees) - Math.abs(a.degrees));

export const modelNames: Record<string, string> = {
  sphere: 'sphere',
  drifting: 'drifting sphere',
  elliptical: 'elliptical sphere',
  cap: 'one cap',
};

/** 'χ²/dof' as a number, or null without degrees of freedom. */
export const chi2PerDof = ({ chi2, dof }: Pick<FitOutcome, 'chi2' | 'dof'>): number | null =>
  dof > 0 ? chi2 / dof : null;

/** How strongly two parameters go together, in one word for the ear. */
export function correlationWord(r: number): string {
  const size = Math.abs(r);
  return size >= 0.9 ? 'very strong' : size >= 0.6 ? 'strong' : size >= 0.3 ? 'moderate' : 'weak';
}
