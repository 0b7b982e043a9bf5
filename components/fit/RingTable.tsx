import { velocityLabel } from '@/shared/image/velocityDigits';
import { decimals } from '../ui/format';
import { Panel } from '../ui/Panel';
import { Quantity } from '../ui/Quantity';
import { Table, type Column } from '../ui/Table';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import type { DoneFit } from './fitFacts';

type Ring = DoneFit['rings'][number];

/** The ring of each channel beside the model's, both in degrees. */
export function RingTable({ fit, channelWidth }: { fit: DoneFit; channelWidth: number }) {
  const columns: Column<Ring>[] = [
    {
      key: 'velocity',
      label: 'v, km/s',
      align: 'right',
      width: space(18),
      cell: (r) => <Text mono>{velocityLabel(r.velocity, channelWidth)}</Text>,
    },
    {
      key: 'marks',
      label: 'marks',
      align: 'right',
      width: space(16),
      cell: (r) => <Text mono>{r.marks}</Text>,
    },
    {
      key: 'theta',
      label: 'ring θ, °',
      align: 'right',
      width: space(36),
      grow: 1,
      cell: (r) => (
        <Quantity
          align="right"
          hideUnit
          quantity={r.theta === null ? null : { value: r.theta, se: r.se, unit: 'deg' }}
        />
      ),
    },
    {
      key: 'model',
      label: 'model, °',
      align: 'right',
      width: space(22),
      cell: (r) => (
        <Text mono tone="model">
          {r.model === null ? '–' : decimals(r.model, 3)}
        </Text>
      ),
    },
  ];
  return (
    <Panel flush title="Rings by channel">
      <Table
        dense
        label="Rings by channel"
        columns={columns}
        rows={fit.rings}
        rowKey={(r) => `${r.velocity}`}
      />
    </Panel>
  );
}
