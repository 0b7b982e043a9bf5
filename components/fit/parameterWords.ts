import type { Constraint, ParameterName } from '@/shared/contract/fits';
import { labelOf } from '@/shared/image/ticks';
import { displayUnit, plainNumber } from '@/shared/physics/quantity';
import { PARAMETER_NAMES, PARAMETER_UNITS, type ModelName } from '@/shared/shell/shellModel';

/** How a parameter is written in running text, where no index can be lowered. */
const written: Record<string, string> = {
  l: 'l',
  b: 'b',
  theta: 'Θ',
  vSys: 'v_sys',
  vExp: 'v_exp',
  driftL: 'drift in l',
  driftB: 'drift in b',
  axisRatio: 'axis ratio',
  positionAngle: 'position angle',
};

export const writtenName = (name: string): string => written[name] ?? name;
export const unitOf = (name: string): string => displayUnit(PARAMETER_UNITS[name] ?? '');
export const parametersOf = (model: ModelName): readonly ParameterName[] =>
  PARAMETER_NAMES[model] as readonly ParameterName[];

/** Names in the order of the fullest model; unknown ones last. */
export function inOrder(names: readonly string[]): string[] {
  const order = Object.keys(written);
  const rank = (name: string) => (order.includes(name) ? order.indexOf(name) : order.length);
  return [...names].sort((a, b) => rank(a) - rank(b));
}

const withUnit = (number: string, name: string) => {
  const unit = unitOf(name);
  return unit === '°' || unit === '' ? number + unit : `${number} ${unit}`;
};
/** '−40 km/s', '1.5°'. */
export const writtenValue = (name: string, value: number): string => withUnit(plainNumber(value, 6), name);

/** Where a fit begins: 'Θ 1.2°, v_sys −40 km/s, v_exp 12 km/s'. */
export const startWords = (start: { theta: number; vSys: number; vExp: number }): string =>
  (['theta', 'vSys', 'vExp'] as const)
    .map((name) => `${writtenName(name)} ${withUnit(plainNumber(start[name], 3), name)}`)
    .join(', ');

/** What was said of a parameter before the fit: 'held at −40 km/s', 'prior −40 ± 2 km/s, not above 0 km/s'. */
export function constraintWords(name: string, { fixed, prior, low, high }: Constraint): string {
  if (fixed !== undefined) return `held at ${writtenValue(name, fixed)}`;
  const said: string[] = [];
  if (prior)
    said.push(`prior ${withUnit(`${plainNumber(prior.mean, 6)} ± ${plainNumber(prior.sd, 6)}`, name)}`);
  if (low !== undefined && high !== undefined)
    said.push(`between ${writtenValue(name, low)} and ${writtenValue(name, high)}`);
  else if (low !== undefined) said.push(`not below ${writtenValue(name, low)}`);
  else if (high !== undefined) said.push(`not above ${writtenValue(name, high)}`);
  return said.join(', ') || 'free';
}

/** A signed share of a standard error: '+0.4', '−1.2', '0.0'. */
export const signed = (value: number, places = 1): string => {
  const text = labelOf(value, places);
  return value > 0 && /[1-9]/.test(text) ? `+${text}` : text;
};
