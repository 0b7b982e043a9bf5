import { View } from 'react-native';
import type { LeftOut } from '@/shared/contract/fits';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { Panel } from '../ui/Panel';
import { ParameterName } from '../ui/Quantity';
import { Table, type Column } from '../ui/Table';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { hairline, radius, space } from '../ui/tokens';
import type { DoneFit } from './fitFacts';
import { mostMoved } from './leftOutWords';
import { inOrder, signed } from './parameterWords';

/** A bar of this many standard errors fills its half. */
const FULL = 2;

/** How far each parameter moves without each channel, as small bars about nought. */
export function LeaveOneOutPanel({ fit, channelWidth }: { fit: DoneFit; channelWidth: number }) {
  const rows = fit.extra.leaveOneOut ?? [];
  if (rows.length === 0) return null;
  const names = inOrder([...new Set(rows.flatMap((r) => Object.keys(r.shiftInSe)))]);
  const columns: Column<LeftOut>[] = [
    {
      key: 'velocity',
      label: 'without v, km/s',
      align: 'right',
      width: space(27),
      cell: (r) => <Text mono>{velocityLabel(r.velocity, channelWidth)}</Text>,
    },
    ...names.map((name): Column<LeftOut> => ({
      key: name,
      label: name,
      head: <ParameterName name={name} size="small" tone="quiet" />,
      width: space(24),
      grow: 1,
      cell: (r) => <ShiftBar shift={r.shiftInSe[name] ?? null} problem={r.problem} />,
    })),
    {
      key: 'score',
      label: 'score',
      align: 'right',
      width: space(15),
      cell: (r) => (
        <Text mono tone="quiet">
          {r.score === null ? '–' : r.score.toFixed(1)}
        </Text>
      ),
    },
  ];
  return (
    <Panel flush title="Without each channel">
      <View style={{ paddingHorizontal: space(4), gap: space(1) }}>
        <Text>{mostMoved(rows)}</Text>
        <Text size="small" tone="quiet">
          {`Shifts in standard errors; a full bar is ${FULL}. Score: mean squared residual of the channel under the fit without it, about 1 where the others foretell it.`}
        </Text>
      </View>
      <Table
        dense
        label="Shift of each parameter without each channel, in standard errors"
        columns={columns}
        rows={rows}
        rowKey={(r) => String(r.velocity)}
      />
    </Panel>
  );
}

function ShiftBar({ shift, problem }: { shift: number | null; problem?: string | undefined }) {
  const { color } = useTheme();
  if (shift === null)
    return (
      <Text size="small" tone="quiet" numberOfLines={1}>
        {problem ? 'no fit' : '–'}
      </Text>
    );
  const half = Math.min(Math.abs(shift) / FULL, 1) * 50;
  return (
    <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(1), alignSelf: 'stretch' }}>
      <View aria-hidden style={{ flex: 1, height: space(3), justifyContent: 'center' }}>
        <View
          style={{
            position: 'absolute',
            left: '50%',
            width: hairline,
            height: space(3),
            backgroundColor: color.control,
          }}
        />
        <View
          style={{
            position: 'absolute',
            left: `${shift < 0 ? 50 - half : 50}%`,
            width: `${half}%`,
            height: space(2),
            borderRadius: radius.small / 3,
            backgroundColor: color.model,
            opacity: Math.abs(shift) >= 1 ? 1 : 0.6,
          }}
        />
      </View>
      <Text
        mono
        size="small"
        weight={Math.abs(shift) >= 1 ? 'semibold' : 'regular'}
        tone={Math.abs(shift) >= 1 ? 'text' : 'quiet'}
        align="right"
        style={{ width: space(8) }}
      >
        {signed(shift)}
      </Text>
    </View>
  );
}
