import { View } from 'react-native';
import { Text } from './Text';
import { useTheme } from './theme';
import { radius, space } from './tokens';

/** How far something is, 0 … 1, with what it is doing in words. */
export function ProgressBar({
  value,
  label,
  activity,
  tone = 'model',
}: {
  value: number;
  label: string;
  activity?: string | null;
  tone?: 'model' | 'person';
}) {
  const { color } = useTheme();
  const percent = Math.round(Math.max(0, Math.min(1, value)) * 100);
  return (
    <View style={{ gap: space(1), alignSelf: 'stretch' }}>
      <View
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent}
        aria-valuetext={activity ? `${percent} per cent, ${activity}` : `${percent} per cent`}
        style={{
          height: space(1.5),
          borderRadius: radius.round,
          backgroundColor: color.chip,
          overflow: 'hidden',
        }}
      >
        <View
          style={{
            height: '100%',
            width: `${percent}%`,
            backgroundColor: color[tone],
            borderRadius: radius.round,
          }}
        />
      </View>
      {activity && (
        <View style={{ flexDirection: 'row', justifyContent: 'space-between', gap: space(2) }}>
          <Text size="small" tone="quiet" numberOfLines={1} style={{ flexShrink: 1 }}>
            {activity}
          </Text>
          <Text size="small" tone="quiet" mono>
            {percent} %
          </Text>
        </View>
      )}
    </View>
  );
}
