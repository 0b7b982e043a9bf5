import type { FitOutcome } from '@/shared/contract/fits';
import { decimals } from '../ui/format';
import { Panel } from '../ui/Panel';
import { ParameterName } from '../ui/Quantity';
import { Table, type Column } from '../ui/Table';
import { HiddenText, Text } from '../ui/Text';
import { space } from '../ui/tokens';

/** Which parameters go together; strong ones stand out by weight, not by colour alone. */
export function CorrelationTable({ correlation }: { correlation: FitOutcome['correlation'] }) {
  const { names, matrix } = correlation;
  const columns: Column<string>[] = [
    {
      key: 'name',
      label: 'Parameter',
      head: <HiddenText>Parameter</HiddenText>,
      width: space(16),
      cell: (n) => <ParameterName name={n} />,
    },
    ...names.map((name, j): Column<string> => ({
      key: name,
      label: name,
      head: <ParameterName name={name} size="small" tone="quiet" />,
      align: 'right',
      width: space(15),
      cell: (_, i) => {
        const r = matrix[i]?.[j];
        if (j > i) return null; // the other half says the same
        if (r == null) return <Text mono>–</Text>;
        if (i === j)
          return (
            <Text mono tone="quiet">
              1
            </Text>
          );
        return (
          <Text
            mono
            weight={Math.abs(r) >= 0.6 ? 'bold' : 'regular'}
            tone={Math.abs(r) >= 0.3 ? 'text' : 'quiet'}
          >
            {decimals(r, 2)}
          </Text>
        );
      },
    })),
  ];
  return (
    <Panel flush title="Correlation of the parameters">
      <Table dense label="Correlation of the parameters" columns={columns} rows={names} rowKey={(n) => n} />
    </Panel>
  );
}
