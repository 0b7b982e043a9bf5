import type { Region, RegionDraft } from '@/shared/contract/regions';
import type { ApiProblem } from '@/hooks/api';

/** What a person types; numbers stay text until the form is sent. */
export interface RegionFormValues {
  name: string;
  description: string;
  l: string;
  b: string;
  distance: string;
  distanceError: string;
}
export type RegionFormProblems = Partial<Record<keyof RegionFormValues, string>>;

export const valuesOf = (region: Region | null): RegionFormValues => ({
  name: region?.name ?? '',
  description: region?.description ?? '',
  l: region?.centre ? String(region.centre.l) : '',
  b: region?.centre ? String(region.centre.b) : '',
  distance: region?.distance ? String(region.distance.pc) : '',
  distanceError: region?.distance?.errorPc != null ? String(region.distance.errorPc) : '',
});

/** A number as people write it: a true minus sign and a decimal comma are fine; null for an empty text. */
export function readNumber(text: string): number | null {
  const plain = text.trim().replace('\u2212', '-').replace(',', '.');
  return plain === '' ? null : Number(plain);
}

/** The draft to send, or what is wrong by field. */
export function readRegionForm(
  values: RegionFormValues,
): { draft: RegionDraft } | { problems: RegionFormProblems } {
  const problems: RegionFormProblems = {};
  const [l, b, pc, errorPc] = [values.l, values.b, values.distance, values.distanceError].map(readNumber);
  if (!values.name.trim()) problems.name = 'Give the region a name.';
  if (l !== null && !(l! >= -360 && l! <= 360)) problems.l = 'A longitude in degrees, from −360 to 360.';
  if (b !== null && !(b! >= -90 && b! <= 90)) problems.b = 'A latitude in degrees, from −90 to 90.';
  if (l === null && b !== null) problems.l = 'A centre needs both, l and b.';
  if (b === null && l !== null) problems.b = 'A centre needs both, l and b.';
  if (pc !== null && !(pc! > 0)) problems.distance = 'A distance in parsecs, greater than 0.';
  if (errorPc !== null && !(errorPc! >= 0)) problems.distanceError = 'An error in parsecs, not below 0.';
  if (pc === null && errorPc !== null) problems.distance = 'An error needs the distance it belongs to.';
  if (Object.keys(problems).length > 0) return { problems };
  return {
    draft: {
      name: values.name.trim(),
      description: values.description.trim(),
      centre: l === null || b === null ? null : { l: l!, b: b! },
      distance: pc === null ? null : { pc: pc!, errorPc: errorPc ?? null },
    },
  };
}

const byField: Record<string, keyof RegionFormValues> = {
  name: 'name',
  description: 'description',
  'centre.l': 'l',
  'centre.b': 'b',
  centre: 'l',
  'distance.pc': 'distance',
  'distance.errorPc': 'distanceError',
  distance: 'distance',
};

/** The server's refusal beside the field it names; null where it names none of ours. */
export function placeProblem(problem: ApiProblem): RegionFormProblems | null {
  const field = problem.field && byField[problem.field];
  return field ? { [field]: problem.detail || problem.title } : null;
}
