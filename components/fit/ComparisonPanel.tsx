import { View } from 'react-native';
import type { Comparison } from '@/shared/contract/fits';
import { plainNumber } from '@/shared/physics/quantity';
import { Chip } from '../ui/Chip';
import { Panel } from '../ui/Panel';
import { Table, type Column } from '../ui/Table';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import type { DoneFit } from './fitFacts';
import { modelNames } from './fitFacts';
import { signed } from './parameterWords';

type Row = Comparison['models'][number];

/** What the same marks say of the other models: a sentence each, the numbers beside. */
export function ComparisonPanel({ fit }: { fit: DoneFit }) {
  const rows = fit.extra.comparison?.models ?? [];
  if (rows.length === 0) return null;
  const least = (of: (row: Row) => number | null) => {
    const values = rows.map(of).filter((v) => v !== null);
    return values.length > 0 ? Math.min(...values) : null;
  };
  const [aicc, bic] = [least((r) => r.aicc), least((r) => r.bic)];
  const over = (value: number | null, from: number | null) => (
    <Text mono>{value === null || from === null ? '–' : signed(value - from)}</Text>
  );
  const columns: Column<Row>[] = [
    {
      key: 'model',
      label: 'Model',
      width: space(40),
      grow: 1,
      cell: (r) => (
        <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2) }}>
          <Text>{modelNames[r.model]}</Text>
          {r.model === fit.model && <Chip label="this fit" kind="model" />}
        </View>
      ),
    },
    {
      key: 'chi2',
      label: 'χ² / dof',
      align: 'right',
      width: space(28),
      cell: (r) => <Text mono>{r.chi2 === null ? '–' : `${r.chi2.toFixed(1)} / ${r.dof ?? '–'}`}</Text>,
    },
    {
      key: 'aicc',
      label: 'AICc above least',
      align: 'right',
      width: space(29),
      cell: (r) => over(r.aicc, aicc),
    },
    { key: 'bic', label: 'BIC above least', align: 'right', width: space(27), cell: (r) => over(r.bic, bic) },
    {
      key: 'leaveOneOut',
      label: 'channel left out',
      align: 'right',
      width: space(28),
      cell: (r) => <Text mono>{r.leaveOneOut === null ? '–' : r.leaveOneOut.toFixed(2)}</Text>,
    },
    {
      key: 'wald',
      label: 'chance on a sphere',
      align: 'right',
      width: space(33),
      cell: (r) => <Text mono>{r.wald ? probability(r.wald.probability) : '–'}</Text>,
    },
  ];
  return (
    <Panel flush title="Other models on the same marks">
      <View style={{ paddingHorizontal: space(4), gap: space(1) }}>
        {rows.map((r) => (
          <Text key={r.model} tone={r.problem ? 'quiet' : 'text'}>
            {r.sentence}
          </Text>
        ))}
      </View>
      <Table dense label="Models compared" columns={columns} rows={rows} rowKey={(r) => r.model} />
      <Text size="small" tone="quiet" style={{ paddingHorizontal: space(4), paddingBottom: space(3) }}>
        The last column decides: how often marks on a plain sphere would show two more parameters this far
        from nought, with errors that know of channels. AICc, BIC and the score of left-out channels stand
        beside it: they take marks as independent and may prefer a model that is not there.
      </Text>
    </Panel>
  );
}

const probability = (p: number): string => (p < 0.001 ? '< 0.001' : plainNumber(p, 2));
