import { View } from 'react-native';
import { useFits } from '@/hooks/useFits';
import { useTraces } from '@/hooks/useTraces';
import { readingsApart, type ParameterApart } from '@/shared/shell/readingsApart';
import { displayUnit, plainNumber } from '@/shared/physics/quantity';
import { Button } from '../ui/Button';
import { Panel } from '../ui/Panel';
import { ParameterName, Quantity } from '../ui/Quantity';
import { Table, type Column } from '../ui/Table';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { isDone, type DoneFit } from './fitFacts';
import { counterpart } from './counterpart';

/** The fit of a person's marks beside that of the rim traced around it: what a bias common to all rings shows in. */
export function ApartPanel({ fit }: { fit: DoneFit }) {
  const fits = (useFits(fit.shellId).data?.items ?? []).filter(isDone);
  const traces = useTraces(fit.shellId).data?.items ?? [];
  const pair = counterpart(fit, fits, traces);
  if (!pair) return null;
  const { marked, traced } = pair;
  const other = fit.id === marked.id ? traced : marked;
  const apart = readingsApart(marked, traced, ['the fit of the marks', 'that of the traced rim']);
  const columns: Column<ParameterApart>[] = [
    {
      key: 'parameter',
      label: 'Parameter',
      width: space(22),
      cell: (p) => (p.parameter === 'centre' ? <Text>centre</Text> : <ParameterName name={p.parameter} />),
    },
    { key: 'marks', label: 'marks', align: 'right', width: space(38), cell: (p) => of(marked, p.parameter) },
    {
      key: 'traced',
      label: 'traced rim',
      align: 'right',
      width: space(38),
      cell: (p) => of(traced, p.parameter),
    },
    {
      key: 'difference',
      label: 'apart',
      align: 'right',
      width: space(25),
      cell: (p) => <Text mono>{`${plainNumber(p.difference, 2)} ${displayUnit(p.unit)}`}</Text>,
    },
    {
      key: 'inErrors',
      label: 'in their errors',
      align: 'right',
      width: space(26),
      cell: (p) => (
        <Text mono weight={p.inErrors !== null && p.inErrors > 2 ? 'semibold' : 'regular'}>
          {p.inErrors === null ? '–' : p.inErrors.toFixed(1)}
        </Text>
      ),
    },
  ];
  return (
    <Panel
      flush
      title="Marks and traced rim compared"
      aside={
        <Button
          kind="quiet"
          label={other.id === marked.id ? 'See the fit of the marks' : 'See the fit of the traced rim'}
          href={`/shells/${fit.shellId}/fits/${other.id}`}
        />
      }
    >
      <View style={{ paddingHorizontal: space(4), gap: space(1) }}>
        {apart.sentences.slice(1).map((sentence) => (
          <Text key={sentence}>{sentence}</Text>
        ))}
      </View>
      <Table
        dense
        label="The two fits, parameter by parameter"
        columns={columns}
        rows={apart.parameters}
        rowKey={(p) => p.parameter}
      />
    </Panel>
  );
}

function of(fit: DoneFit, parameter: ParameterApart['parameter']) {
  if (parameter === 'centre') return null;
  return <Quantity align="right" hideUnit quantity={fit.parameters[parameter]} />;
}
