import type { Parameter } from '@/shared/contract/fits';
import type { ShellMeasures } from '@/shared/contract/shells';
import { AGE_FACTOR, kinematicAge } from '@/shared/physics/age';
import { linearRadius } from '@/shared/physics/size';
import type { AdoptedOutcome, ShellRow } from '../store/shells';

/** What a catalogue row says of a shell: the adopted fit and, with a distance, what follows from it. */
export function measuresOf(row: ShellRow): ShellMeasures | null {
  const { outcome } = row;
  const { l, b, theta, vSys, vExp } = outcome?.parameters ?? {};
  if (!outcome || !l || !b || !theta || !vSys || !vExp) return null;
  const distance = distanceOf(row);
  const radius = distance && linearRadius({ value: distance.pc, se: distance.errorPc }, theta);
  // only the part of R's error that comes from Θ goes along with v_exp
  const fromTheta = distance && linearRadius({ value: distance.pc, se: 0 }, theta).se;
  const correlation =
    radius && fromTheta && radius.se > 0 ? (correlationOf(outcome) * fromTheta) / radius.se : 0;
  const age = radius && kinematicAge(radius, vExp, { correlation });
  return {
    l,
    b,
    theta,
    vSys,
    vExp,
    radius: radius && symmetric(radius, 'pc'),
    // where v_exp has no upper limit there is no lower limit to the age either
    age: age && { ...symmetric(age, 'Myr'), ...(vExp.hi === null && { lo: null, se: null }) },
    ageFactor: AGE_FACTOR,
    distance,
    chi2PerDof: outcome.dof > 0 ? outcome.chi2 / outcome.dof : null,
    marks: outcome.provenance.marks,
    model: outcome.model,
    warnings: outcome.warnings.map((w) => w.code),
  };
}

function distanceOf(row: ShellRow): ShellMeasures['distance'] {
  if (row.distancePc !== null) return { pc: row.distancePc, errorPc: row.distanceErrorPc, source: 'shell' };
  if (row.regionDistancePc !== null)
    return { pc: row.regionDistancePc, errorPc: row.regionDistanceErrorPc, source: 'region' };
  return null;
}

const symmetric = ({ value, se }: { value: number; se: number }, unit: string): Parameter => ({
  value,
  se,
  lo: value - se,
  hi: value + se,
  unit,
});

/** Of Θ and v_exp in the fit; 0 when one of them was held. */
function correlationOf({ correlation: { names, matrix } }: AdoptedOutcome): number {
  return matrix[names.indexOf('theta')]?.[names.indexOf('vExp')] ?? 0;
}
