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
  const named = (name: string) => <ParameterName name={name} tone="quiet" size="small" />;
  const facts = [
    { key: 'theta', name: named('theta'), unit: '°', quantity: m?.theta },
    { key: 'radius', name: named('radius'), unit: 'pc', quantity: m?.radius },
    { key: 'vSys', name: named('vSys'), unit: 'km/s', quantity: m?.vSys },
    { key: 'vExp', name: named('vExp'), unit: 'km/s', quantity: m?.vExp },
    { key: 'age', name: m ? `${m.ageFactor} R/v` : 'age', unit: 'Myr', quantity: m?.age },
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
      <View style={{ flexDirection: 'row', alignItems: 'center', paddingRight: space(4) }}>
        <View style={{ paddingLeft: space(4) }}>
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
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', paddingHorizontal: space(4), rowGap: space(2) }}>
        {facts.map((f) => (
          <View key={f.key} style={half}>
            <Text size="small" tone="quiet">
              {f.name}, {f.unit}
            </Text>
            <Quantity hideUnit quantity={f.quantity} size="small" />
          </View>
        ))}
        <View style={half}>
          <Text size="small" tone="quiet">
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

const half = { flexBasis: '50%', minWidth: 0 } as const;
