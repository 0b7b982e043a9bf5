import { decimals } from '../ui/format';
import { ParameterName } from '../ui/Quantity';
import { Table, type Column } from '../ui/Table';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { percentile, type DrawColumn } from './drawColumns';
import { unitOf } from './parameterWords';

const SHARES = [
  [0.0228, '2.3 %'],
  [0.1587, '16 %'],
  [0.5, '50 %'],
  [0.8413, '84 %'],
  [0.9772, '97.7 %'],
] as const;

/** The draws as numbers: what the plot shows, for ears and for copying. */
export function PercentileTable({ columns }: { columns: readonly DrawColumn[] }) {
  const heads: Column<DrawColumn>[] = [
    {
      key: 'name',
      label: 'Parameter',
      width: space(24),
      cell: (c) => (
        <Text>
          <ParameterName name={c.name} />
          {unitOf(c.name) ? (
            <Text size="small" tone="quiet">
              {` ${unitOf(c.name)}`}
            </Text>
          ) : null}
        </Text>
      ),
    },
    ...SHARES.map(([share, label]): Column<DrawColumn> => ({
      key: label,
      label,
      align: 'right',
      width: space(21),
      cell: (c) => {
        const value = percentile(c.values, share);
        return (
          <Text mono size={value === null ? 'small' : 'body'} tone={value === null ? 'person' : 'text'}>
            {value === null ? 'no bound' : decimals(value, placesOf(c))}
          </Text>
        );
      },
    })),
  ];
  return (
    <Table dense label="Percentiles of the draws" columns={heads} rows={columns} rowKey={(c) => c.name} />
  );
}

/** Decimals that show two digits of half the central 68 %. */
function placesOf({ values }: DrawColumn): number {
  const [low, high] = [percentile(values, 0.1587), percentile(values, 0.8413)];
  const half = low === null || high === null ? 0 : (high - low) / 2;
  return half > 0 ? Math.min(Math.max(1 - Math.floor(Math.log10(half)), 0), 8) : 4;
}
