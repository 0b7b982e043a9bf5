import { formatQuantity } from '@/shared/physics/quantity';
import { count } from '../ui/format';
import { channelsOf, extraOf } from './fitExtra';
import { modelNames, type DoneFit } from './fitFacts';
import { constraintWords, inOrder, startWords, writtenName } from './parameterWords';

const WORKS = {
  'Beaton & Tukey 1974': 'Beaton, A. E., & Tukey, J. W. 1974, Technometrics, 16, 147',
  'Efron & Tibshirani 1993':
    'Efron, B., & Tibshirani, R. J. 1993, An Introduction to the Bootstrap (New York: Chapman & Hall)',
  'Henderson 1953': 'Henderson, C. R. 1953, Biometrics, 9, 226',
  'Marquardt 1963':
    'Marquardt, D. W. 1963, Journal of the Society for Industrial and Applied Mathematics, 11, 431',
  'Orear 1982': 'Orear, J. 1982, American Journal of Physics, 50, 912',
  'Satterthwaite 1946': 'Satterthwaite, F. E. 1946, Biometrics Bulletin, 2, 110',
} as const;

export interface Methods {
  paragraph: string;
  references: string[];
}

/** How the numbers of a fit were got, as a paragraph for a paper, with the works that it cites. */
export function methodsOf(fit: DoneFit, shellName: string): Methods {
  const paragraph = [data(fit, shellName), model(fit), minimum(fit), errors(fit), results(fit), limits(fit)]
    .filter(Boolean)
    .join(' ');
  const references = Object.entries(WORKS)
    .filter(([key]) => paragraph.includes(key))
    .map(([, work]) => work);
  return { paragraph, references };
}

/** Paragraph and references as they are copied. */
export const methodsText = ({ paragraph, references }: Methods): string =>
  `${paragraph}\n\nReferences\n${references.join('\n')}\n`;

function data(fit: DoneFit, name: string): string {
  const marks = count(fit.provenance.marks, fit.traceId ? 'point' : 'mark');
  const channels = count(channelsOf(fit), 'velocity channel');
  return fit.traceId
    ? `The rim of ${name} was traced from the brightness by sectors of azimuth, which gave ${marks} in ${channels} (neighbouring ones share errors).`
    : `The rim of ${name} was marked by eye at ${count(fit.provenance.marks, 'point')} in ${channels}.`;
}

const shapes: Record<string, string> = {
  sphere: 'a thin sphere that expands evenly',
  drifting: 'a thin expanding sphere whose centre drifts across the sky with velocity',
  elliptical: 'a thin expanding shell with elliptical rings of one axis ratio and position angle',
  cap: 'a thin expanding sphere of which one side is seen',
};

function model(fit: DoneFit): string {
  const said = inOrder(Object.keys(fit.parameters)).flatMap((name) => {
    const constraint = fit.parameters[name]!.constraint;
    return constraint ? [`${writtenName(name)} ${constraintWords(name, constraint)}`] : [];
  });
  return (
    `All points were fitted together by ${shapes[fit.model] ?? modelNames[fit.model]}, on great circles, with the ring radius averaged over ` +
    'the visible part of each channel; a point’s variance is that of its position and, in the spirit of the effective ' +
    'variance (Orear 1982), that of the radius within its channel.' +
    (said.length > 0 ? ` Constraints: ${said.join('; ')}.` : '')
  );
}

function minimum(fit: DoneFit): string {
  const setAside = extraOf(fit).setAside.length;
  const rule =
    fit.options?.setAside === false
      ? 'Every point was kept.'
      : `After a robust pass with Tukey’s biweight (Beaton & Tukey 1974), points more than 4.5 robust deviations off ` +
        `the ring of their own channel were set aside: ${setAside} of ${fit.provenance.marks}.`;
  const start = fit.options?.start ? ` The fit began with ${startWords(fit.options.start)}.` : '';
  return `${rule}${start} The sum of squares was minimised by the Levenberg–Marquardt method (Marquardt 1963), with the weights renewed until they no longer changed.`;
}

function errors(fit: DoneFit): string {
  const base =
    'Standard errors combine four sources of scatter (single points, the radius within a channel, offsets of whole ' +
    'rings in radius and in centre), whose variances were estimated by the method of moments (Henderson 1953), with ' +
    'Student’s t for their degrees of freedom (Satterthwaite 1946).';
  if (fit.errorBars !== 'bootstrap') return `${base} Intervals are those of 68 %, for v_exp in 1/v_exp².`;
  const draws = extraOf(fit).bootstrap?.draws ?? fit.options?.bootstrap;
  return (
    `${base} Intervals are the 16th and 84th percentiles of ${draws ?? 'the'} draws of a parametric bootstrap with these ` +
    `sources (Efron & Tibshirani 1993; seed ${fit.provenance.seed ?? 'not kept'}).`
  );
}

function results(fit: DoneFit): string {
  const numbers = inOrder(Object.keys(fit.parameters)).map((name) => {
    const { constraint, ...quantity } = fit.parameters[name]!;
    const held = constraint?.fixed !== undefined;
    return `${writtenName(name)} = ${formatQuantity(quantity).line}${held ? ' (held)' : ''}`;
  });
  return `The result is ${numbers.join(', ')}, with χ² = ${fit.chi2.toFixed(1)} for ${fit.dof} degrees of freedom.`;
}

function limits(fit: DoneFit): string {
  const bias = fit.traceId ? '' : 'A bias common to all rings is not part of the errors.';
  const version = fit.provenance.codeVersion;
  return [bias, version ? `Fitted with Outswell, version ${version}.` : 'Fitted with Outswell.']
    .filter(Boolean)
    .join(' ');
}
