import { useState } from 'react';
import { View } from 'react-native';
import { useFitMarks } from '@/hooks/useFits';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { Button } from '../ui/Button';
import { decimals } from '../ui/format';
import { Panel } from '../ui/Panel';
import { Press, type PressState } from '../ui/Press';
import { Table, type Column } from '../ui/Table';
import { HiddenText, Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { radius, space, touch } from '../ui/tokens';
import { byLargest, type DoneFit } from './fitFacts';

const FIRST = 10;
type Residual = DoneFit['residuals'][number];

/** Residuals by mark, the largest first; a mark's row leads to it on its channel map. */
export function ResidualTable({ fit }: { fit: DoneFit }) {
  const { color } = useTheme();
  const marks = useFitMarks(fit.id);
  const [all, setAll] = useState(false);
  const sorted = byLargest(fit);
  const largest = Math.abs(sorted[0]?.degrees ?? 1) || 1;
  const setAside = fit.residuals.filter((r) => r.weight === 0).length;
  const markOf = (r: Residual) => marks.data?.marks[r.mark];
  const places = largest < 0.01 ? 5 : largest < 0.1 ? 4 : 3;

  const columns: Column<Residual>[] = [
    {
      key: 'mark',
      label: 'Mark',
      width: space(22),
      grow: 0,
      cell: (r) => {
        const mark = markOf(r);
        const text = `No. ${r.mark + 1}`;
        if (!mark) return <Text mono>{text}</Text>;
        return (
          <Press
            href={`/cubes/${fit.cubeId}?shell=${fit.shellId}&ch=${mark.channel}&mark=${r.mark}`}
            aria-label={`${text}, channel ${mark.channel}`}
            style={({ hovered }: PressState) => ({
              minHeight: touch,
              minWidth: touch,
              justifyContent: 'center',
              opacity: hovered ? 0.75 : 1,
            })}
          >
            <Text mono tone="person" style={{ textDecorationLine: 'underline' }}>
              {text}
            </Text>
          </Press>
        );
      },
    },
    {
      key: 'velocity',
      label: 'v, km/s',
      width: space(20),
      align: 'right',
      cell: (r) => (
        <Text mono>{markOf(r) ? velocityLabel(markOf(r)!.velocity, marks.data!.channelWidth) : '…'}</Text>
      ),
    },
    {
      key: 'degrees',
      label: 'residual, °',
      width: space(24),
      align: 'right',
      cell: (r) => <Text mono>{decimals(r.degrees, places)}</Text>,
    },
    {
      key: 'bar',
      label: 'size',
      head: <HiddenText>size</HiddenText>,
      width: space(24),
      grow: 1,
      cell: (r) =>
        r.weight === 0 ? (
          <Text size="small" tone="quiet">
            set aside
          </Text>
        ) : (
          <View aria-hidden style={{ alignSelf: 'stretch', height: space(2), flexDirection: 'row' }}>
            <View
              style={{
                width: `${(Math.abs(r.degrees) / largest) * 100}%`,
                borderRadius: radius.round,
                backgroundColor: color.person,
                opacity: 0.4 + 0.6 * Math.min(1, r.weight),
              }}
            />
          </View>
        ),
    },
  ];
  const hidden = sorted.length - FIRST;
  return (
    <Panel
      flush
      title="Residuals by mark"
      aside={
        <Text size="small" tone="quiet">
          {`largest first${setAside > 0 ? `, ${setAside} set aside` : ''}`}
        </Text>
      }
    >
      <Table
        label="Residuals by mark"
        columns={columns}
        rows={all ? sorted : sorted.slice(0, FIRST)}
        rowKey={(r) => String(r.mark)}
      />
      {hidden > 0 && (
        <View style={{ padding: space(2), paddingTop: 0 }}>
          <Button
            kind="quiet"
            label={all ? `Show the ${FIRST} largest` : `Show all ${sorted.length}`}
            onPress={() => setAll(!all)}
          />
        </View>
      )}
    </Panel>
  );
}
