import { plainNumber } from '@/shared/physics/quantity';
import { DefinitionRows } from '../ui/DefinitionRows';
import { count, moment } from '../ui/format';
import { Panel } from '../ui/Panel';
import { Text } from '../ui/Text';
import type { DoneFit } from './fitFacts';

const labels: Record<string, string> = { theta: 'Θ', vSys: 'v sys', vExp: 'v exp', l: 'l', b: 'b' };

/** What made this fit, so that it can be made again. */
export function Provenance({ fit }: { fit: DoneFit }) {
  const { provenance: p } = fit;
  const starts = Object.entries(p.startValues).map(
    ([name, value]) => `${labels[name] ?? name} ${value === null ? '–' : plainNumber(value)}`,
  );
  return (
    <Panel title="Provenance">
      <DefinitionRows
        dense
        rows={[
          { key: 'by', name: 'Run by', value: <Text align="right">{fit.createdBy?.name ?? 'unknown'}</Text> },
          { key: 'at', name: 'Finished', value: fit.finishedAt ? moment(fit.finishedAt) : '–' },
          { key: 'marks', name: 'Frozen marks', value: count(p.marks, 'mark') },
          { key: 'start', name: 'Start values', value: starts.join(', ') || '–' },
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
