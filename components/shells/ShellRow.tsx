import { View } from 'react-native';
import Svg, { Circle, Path } from 'react-native-svg';
import type { Shell } from '@/shared/contract/shells';
import { StatusChip } from '../ui/Chip';
import { count } from '../ui/format';
import { Press, type PressState } from '../ui/Press';
import { ParameterName, Quantity } from '../ui/Quantity';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { radius, space, touch } from '../ui/tokens';

/** Marks of all readings, in words. */
export function readingWords(shell: Shell): string {
  const marks = shell.readings.reduce((n, r) => n + r.marks, 0);
  if (marks === 0) return 'no marks yet';
  const channels = Math.max(...shell.readings.map((r) => r.channels));
  return `${count(marks, 'mark')} · ${count(channels, 'channel')}`;
}

/** A shell in a list: sign, name, what is known, status. */
export function ShellRow({ shell, showNumbers = true }: { shell: Shell; showNumbers?: boolean }) {
  const { color } = useTheme();
  return (
    <View role="listitem">
      <Press
        href={`/shells/${shell.id}`}
        style={({ hovered }: PressState) => ({
          minHeight: touch + space(3),
          flexDirection: 'row',
          alignItems: 'center',
          gap: space(3),
          paddingHorizontal: space(4),
          paddingVertical: space(2),
          borderRadius: radius.small,
          backgroundColor: hovered ? color.selected : 'transparent',
        })}
      >
        <ShellSign shell={shell} />
        <View style={{ flex: 1, minWidth: 0, gap: space(0.5) }}>
          <Text weight="semibold" numberOfLines={2} style={{ overflowWrap: 'anywhere' } as object}>
            {shell.name}
          </Text>
          <Text size="small" mono tone="quiet" numberOfLines={1}>
            {shell.designation ?? readingWords(shell)}
          </Text>
          {showNumbers && shell.adopted && (
            <View
              style={{
                flexDirection: 'row',
                flexWrap: 'wrap',
                columnGap: space(4),
                rowGap: space(0.5),
                paddingTop: space(0.5),
              }}
            >
              {(['theta', 'vExp'] as const).map((key) => (
                <View key={key} style={{ flexDirection: 'row', gap: space(1.5), alignItems: 'baseline' }}>
                  <ParameterName name={key} size="small" tone="quiet" />
                  <Quantity quantity={shell.adopted![key]} size="small" />
                </View>
              ))}
            </View>
          )}
        </View>
        <StatusChip status={shell.status} />
      </Press>
    </View>
  );
}

/** A closed ring for a shell with an adopted fit, an open one for marks, a broken one for neither. */
export function ShellSign({ shell, size = 24 }: { shell: Shell; size?: number }) {
  const { color } = useTheme();
  const marked = shell.readings.some((r) => r.marks > 0);
  return (
    <Svg width={size} height={size} viewBox="0 0 24 24" aria-hidden fill="none">
      {shell.adopted ? (
        <Circle cx={12} cy={12} r={9} stroke={color.model} strokeWidth={2} />
      ) : marked ? (
        <Path d="M12 3a9 9 0 1 1-7.8 4.5" stroke={color.person} strokeWidth={2} strokeLinecap="round" />
      ) : (
        <Path
          d="M15 3.5A9 9 0 0 1 20.5 9M20 16a9 9 0 0 1-6 4.8M8 20A9 9 0 0 1 3.2 13.5M4.5 7A9 9 0 0 1 9.5 3.3"
          stroke={color.quiet}
          strokeWidth={2}
          strokeLinecap="round"
        />
      )}
    </Svg>
  );
}
