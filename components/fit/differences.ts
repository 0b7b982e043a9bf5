import type { Fit } from '@/shared/contract/fits';
import type { Trace } from '@/shared/contract/traces';
import { count } from '../ui/format';
import { isDone, modelNames } from './fitFacts';
import { constraintWords, inOrder, startWords, writtenName } from './parameterWords';

type Kind = 'model' | 'source' | 'marks' | 'constraints' | 'start' | 'setAside' | 'draws' | 'seed';
type Facts = Record<Kind, string>;

/**
 * What tells the fits of a shell apart, by fit: only what is not the same in all of them. The model is always said, and
 * so are constraints and a traced rim, which nobody should have to guess.
 */
export function differences(fits: readonly Fit[], traces: readonly Trace[] = []): Map<string, string[]> {
  const facts = fits.map((fit) => factsOf(fit, traces));
  const differs = (kind: Kind) => new Set(facts.map((f) => f[kind])).size > 1;
  const shown = (kind: Kind, f: Facts, fit: Fit): boolean =>
    kind === 'model' ||
    (kind === 'constraints' && f.constraints !== 'every parameter free') ||
    (kind === 'source' && fit.traceId !== null) ||
    differs(kind);
  const kinds: Kind[] = ['model', 'source', 'marks', 'constraints', 'start', 'setAside', 'draws', 'seed'];
  return new Map(
    fits.map((fit, i) => [
      fit.id,
      kinds.filter((kind) => shown(kind, facts[i]!, fit) && facts[i]![kind]).map((kind) => facts[i]![kind]),
    ]),
  );
}

function factsOf(fit: Fit, traces: readonly Trace[]): Facts {
  return {
    model: modelNames[fit.model] ?? fit.model,
    source: sourceOf(fit, traces),
    marks: marksOf(fit),
    constraints: constraintsOf(fit),
    start: fit.options.start ? `begun with ${startWords(fit.options.start)}` : 'usual start',
    setAside: setAsideOf(fit),
    draws: fit.options.bootstrap > 0 ? count(fit.options.bootstrap, 'draw') : 'no draws',
    seed: fit.options.bootstrap > 0 ? `seed ${fit.options.seed}` : '',
  };
}

export function sourceOf(fit: Pick<Fit, 'traceId' | 'createdBy'>, traces: readonly Trace[]): string {
  if (fit.traceId === null) return 'marks by hand';
  return edgeWords(traces.find((t) => t.id === fit.traceId)?.edge);
}

export const edgeWords = (edge: Trace['edge'] | undefined): string =>
  edge === undefined ? 'traced rim' : edge === 'ridge' ? 'traced ridge' : 'traced inner edge';

/** Marks are told apart by their revision; how many there were helps a person to know which. */
function marksOf(fit: Fit): string {
  const number = isDone(fit) ? count(fit.provenance.marks, 'mark') : '';
  return [number, fit.traceId === null && `revision ${fit.readingRevision}`].filter(Boolean).join(', ');
}

function constraintsOf({ options }: Fit): string {
  const said = options.constraints ?? {};
  const { vSys } = options;
  const all = {
    ...said,
    ...(vSys && {
      vSys: vSys.sigma > 0 ? { prior: { mean: vSys.value, sd: vSys.sigma } } : { fixed: vSys.value },
    }),
  } as Record<string, Parameters<typeof constraintWords>[1]>;
  const words = inOrder(Object.keys(all)).map(
    (name) => `${writtenName(name)} ${constraintWords(name, all[name]!)}`,
  );
  return words.length > 0 ? words.join('; ') : 'every parameter free';
}

function setAsideOf(fit: Fit): string {
  if (!fit.options.setAside) return 'every mark kept';
  return isDone(fit) ? `${fit.extra.setAside.length} set aside` : 'outliers set aside';
}
