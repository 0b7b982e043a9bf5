import { View } from 'react-native';
import type { Shell } from '@/shared/contract/shells';
import { CheckBox } from '../ui/CheckBox';
import { StatusChip } from '../ui/Chip';
import { Press, type PressState } from '../ui/Press';
import { Quantity } from '../ui/Quantity';
import { HeadText, type Column } from '../ui/Table';
import { HiddenText, Sub, Text } from '../ui/Text';
import { space, touch } from '../ui/tokens';
import type { SortKey } from './filters';
import { Glyph } from './glyphs';

type Measure = 'theta' | 'radius' | 'vSys' | 'vExp' | 'age';

const number = (
  key: Measure,
  label: string,
  width: number,
  head?: React.ReactNode,
): Column<Shell> & { key: SortKey } => ({
  key,
  label,
  head,
  align: 'right',
  width: space(width),
  grow: 1,
  sortable: true,
  cell: (s) => <Quantity quantity={s.adopted?.[key]} hideUnit align="right" size="small" />,
});

const indexed = (main: string, sub: string, unit: string) => (
  <HeadText>
    {main}
    <Sub tone="quiet">{sub}</Sub>, {unit}
  </HeadText>
);

/** The columns of the catalogue; the age's head states its factor. */
export function catalogueColumns({
  regionIndex,
  picked,
  onPick,
  mayPick,
  ageFactor,
}: {
  regionIndex: (regionId: string) => number;
  picked: readonly string[];
  onPick: (shellId: string) => void;
  mayPick: (shellId: string) => boolean;
  ageFactor: number;
}): Column<Shell>[] {
  return [
    {
      key: 'pick',
      label: 'Compare',
      head: <HiddenText>Compare</HiddenText>,
      width: touch,
      grow: 0,
      cell: (s) => (
        <CheckBox
          label={`Compare ${s.name}`}
          checked={picked.includes(s.id)}
          disabled={!mayPick(s.id)}
          onChange={() => onPick(s.id)}
        />
      ),
    },
    {
      key: 'designation',
      label: 'Shell',
      width: space(31),
      grow: 2,
      sortable: true,
      cell: (s) => (
        <Press
          href={`/shells/${s.id}`}
          style={({ hovered }: PressState) => ({
            minHeight: touch,
            justifyContent: 'center',
            alignSelf: 'stretch',
            opacity: hovered ? 0.8 : 1,
          })}
        >
          <Text weight="semibold" numberOfLines={1}>
            {s.name}
          </Text>
          <Text size="small" mono tone="quiet" numberOfLines={1}>
            {s.designation ?? '–'}
          </Text>
        </Press>
      ),
    },
    {
      key: 'region',
      label: 'Region',
      width: space(24),
      grow: 1,
      sortable: true,
      cell: (s) => (
        <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(1.5), maxWidth: '100%' }}>
          <Glyph index={regionIndex(s.regionId)} />
          <Text size="small" numberOfLines={2} style={{ flexShrink: 1 }}>
            {s.regionName}
          </Text>
        </View>
      ),
    },
    number('theta', 'Θ, °', 33),
    number('radius', 'R, pc', 24),
    number('vSys', 'v sys, km/s', 29, indexed('v', 'sys', 'km/s')),
    number('vExp', 'v exp, km/s', 28, indexed('v', 'exp', 'km/s')),
    number('age', `age ${ageFactor} R/v, Myr`, 29, <HeadText>{`${ageFactor} R/v, Myr`}</HeadText>),
    {
      key: 'quality',
      label: 'χ²/dof',
      align: 'right',
      width: space(15),
      sortable: true,
      cell: (s) => (
        <Text mono size="small">
          {s.adopted?.chi2PerDof == null ? '–' : s.adopted.chi2PerDof.toFixed(2)}
        </Text>
      ),
    },
    {
      key: 'status',
      label: 'Status',
      align: 'right',
      width: space(24),
      sortable: true,
      cell: (s) => <StatusChip status={s.status} />,
    },
  ];
}
