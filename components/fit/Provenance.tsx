import { plainNumber } from '@/shared/physics/quantity';
import { DefinitionRows } from '../ui/DefinitionRows';
import { count, moment } from '../ui/format';
import { Panel } from '../ui/Panel';
import { Text } from '../ui/Text';
import type { DoneFit } from './fitFacts';
import { constraintWords, inOrder, writtenName } from './parameterWords';

/** What made this fit, so that it can be made again. */
export function Provenance({ fit }: { fit: DoneFit }) {
  const { provenance: p, options } = fit;
  const starts = inOrder(Object.keys(p.startValues)).map((name) => {
    const value = p.startValues[name];
    return `${writtenName(name)} ${value == null ? '–' : plainNumber(value)}`;
  });
  const said = inOrder(Object.keys(fit.parameters)).flatMap((name) => {
    const constraint = fit.parameters[name]!.constraint;
    return constraint ? [`${writtenName(name)} ${constraintWords(name, constraint)}`] : [];
  });
  const text = (words: string) => <Text align="right">{words}</Text>;
  return (
    <Panel title="Provenance">
      <DefinitionRows
        dense
        rows={[
          { key: 'by', name: 'Run by', value: text(fit.createdBy?.name ?? 'unknown') },
          { key: 'at', name: 'Finished', value: fit.finishedAt ? moment(fit.finishedAt) : '–' },
          {
            key: 'marks',
            name: fit.traceId ? 'Traced points' : 'Frozen marks',
            value: count(p.marks, fit.traceId ? 'point' : 'mark'),
          },
          { key: 'constraints', name: 'Constraints', value: text(said.join('; ') || 'none') },
          {
            key: 'outliers',
            name: 'Outliers',
            value: text(options?.setAside === false ? 'every mark kept' : 'set aside by the rule'),
          },
          {
            key: 'start',
            name: 'Start values',
            value: text(`${starts.join(', ') || '–'}${options?.start ? ' (set by hand)' : ''}`),
          },
          { key: 'iterations', name: 'Iterations', value: String(p.iterations) },
          { key: 'seed', name: 'Random seed', value: String(p.seed ?? '–') },
          { key: 'code', name: 'Code version', value: p.codeVersion ?? '–' },
          ...(fit.aicc == null ? [] : [{ key: 'aicc', name: 'AICc', value: fit.aicc.toFixed(1) }]),
          ...(fit.bic == null ? [] : [{ key: 'bic', name: 'BIC', value: fit.bic.toFixed(1) }]),
        ]}
      />
    </Panel>
  );
}
