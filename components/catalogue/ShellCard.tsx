import { View } from 'react-native';
import type { Shell } from '@/shared/contract/shells';
import { CheckBox } from '../ui/CheckBox';
import { StatusChip } from '../ui/Chip';
import { Press } from '../ui/Press';
import { ParameterName, Quantity } from '../ui/Quantity';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { hairline, radius, space, touch } from '../ui/tokens';
import { Glyph } from './glyphs';

/** A row of the catalogue on a phone. */
export function ShellCard({
  shell,
  regionIndex,
  picked,
  mayPick,
  onPick,
}: {
  shell: Shell;
  regionIndex: number;
  picked: boolean;
  mayPick: boolean;
  onPick: () => void;
}) {
  const { color } = useTheme();
  const m = shell.adopted;
  const pairs = [
    { key: 'theta', name: <ParameterName name="theta" tone="quiet" size="small" />, quantity: m?.theta },
    { key: 'radius', name: <ParameterName name="radius" tone="quiet" size="small" />, quantity: m?.radius },
    { key: 'vSys', name: <ParameterName name="vSys" tone="quiet" size="small" />, quantity: m?.vSys },
    { key: 'vExp', name: <ParameterName name="vExp" tone="quiet" size="small" />, quantity: m?.vExp },
    {
      key: 'age',
      name: (
        <Text size="small" tone="quiet">
          {m ? `${m.ageFactor} R/v` : 'age'}
        </Text>
      ),
      quantity: m?.age,
    },
  ];
  return (
    <View
      role="listitem"
      style={{
        borderRadius: radius.large,
        borderWidth: hairline,
        borderColor: picked ? color.person : color.line,
        backgroundColor: picked ? color.selected : color.panel,
        paddingBottom: space(3),
      }}
    >
      <View style={{ flexDirection: 'row', alignItems: 'center', paddingRight: space(4), gap: space(1) }}>
        <View style={{ paddingLeft: space(3) }}>
          <CheckBox label={`Compare ${shell.name}`} checked={picked} disabled={!mayPick} onChange={onPick} />
        </View>
        <Press
          href={`/shells/${shell.id}`}
          style={{ flex: 1, minHeight: touch + space(3), justifyContent: 'center' }}
        >
          <Text weight="semibold" numberOfLines={1}>
            {shell.name}
          </Text>
          <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(1.5) }}>
            <Glyph index={regionIndex} size={12} />
            <Text size="small" tone="quiet" numberOfLines={1} style={{ flexShrink: 1 }}>
              {[shell.regionName, shell.designation].filter(Boolean).join(' · ')}
            </Text>
          </View>
        </Press>
        <StatusChip status={shell.status} />
      </View>
      <View
        style={{ flexDirection: 'row', flexWrap: 'wrap', paddingHorizontal: space(4), rowGap: space(1.5) }}
      >
        {pairs.map((p) => (
          <View
            key={p.key}
            style={{ flexBasis: '50%', flexDirection: 'row', gap: space(2), alignItems: 'baseline' }}
          >
            <View style={{ minWidth: space(8) }}>{p.name}</View>
            <Quantity quantity={p.quantity} size="small" />
          </View>
        ))}
        <View style={{ flexBasis: '50%', flexDirection: 'row', gap: space(2), alignItems: 'baseline' }}>
          <Text size="small" tone="quiet" style={{ minWidth: space(8) }}>
            χ²/dof
          </Text>
          <Text size="small" mono>
            {m?.chi2PerDof == null ? '–' : m.chi2PerDof.toFixed(2)}
          </Text>
        </View>
      </View>
    </View>
  );
}
