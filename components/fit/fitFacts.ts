import type { Fit, FitOutcome, FrozenMarks } from '@/shared/contract/fits';
import { DEGREE } from '@/shared/sky/greatCircle';
import type { DiagramModel, DiagramRing } from '../diagram/diagramScale';
import { radiusErrorOf } from '../diagram/modelError';

export type DoneFit = Fit & FitOutcome;
/** A fit with its outcome; until it is done there is none. */
export const isDone = (fit: Fit | undefined): fit is DoneFit =>
  fit?.status === 'done' && fit.parameters !== undefined;

/**
 * The radius whose circle stands for an ellipse on the diagram, degrees: the one of the ring equation
 * sin²θ (1 − e cos 2ψ) = sin²Θ_m (1 − u²), from the larger semi-axis and the axis ratio q, with e = (1 − q²)/(1 + q²).
 */
export function roundRadius(theta: number, axisRatio: number | null | undefined): number {
  if (axisRatio == null) return theta;
  const q2 = axisRatio ** 2;
  return Math.asin(Math.sin(theta * DEGREE) * Math.sqrt((2 * q2) / (1 + q2))) / DEGREE;
}

/** The model curve of a fit for the radius–velocity diagram; null for a fit without the three numbers of a sphere. */
export function modelOf(fit: FitOutcome): DiagramModel | null {
  const { theta, vSys, vExp, axisRatio } = fit.parameters;
  if (!theta || !vSys || !vExp) return null;
  const errorAt = radiusErrorOf(fit) ?? undefined;
  return {
    theta: roundRadius(theta.value, axisRatio?.value),
    vSys: vSys.value,
    vExp: vExp.value,
    ...(errorAt && { errorAt }),
  };
}

/**
 * Single marks as the diagram takes them: the model's radius on their channel and how far they lie off it, so that drift
 * and shape are taken out. Marks set aside are left out.
 */
export function markPoints(fit: FitOutcome, frozen: FrozenMarks): { velocity: number; radius: number }[] {
  const near = frozen.channelWidth * 1e-3;
  return fit.residuals.flatMap((r) => {
    const mark = frozen.marks[r.mark];
    const ring = mark && fit.rings.find((k) => Math.abs(k.velocity - mark.velocity) <= near);
    if (!mark || ring?.model == null || r.weight === 0) return [];
    return [{ velocity: mark.velocity, radius: ring.model + r.degrees }];
  });
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
