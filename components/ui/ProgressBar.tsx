import { View } from 'react-native';
import { Text } from './Text';
import { useTheme } from './theme';
import { radius, space } from './tokens';

/** How far something is, 0 … 1, with what it is doing in words; null where nobody can say how far. */
export function ProgressBar({
  value,
  label,
  activity,
  tone = 'model',
}: {
  value: number | null;
  label: string;
  activity?: string | null;
  tone?: 'model' | 'person';
}) {
  const { color } = useTheme();
  const percent = value === null ? null : Math.round(Math.max(0, Math.min(1, value)) * 100);
  const known =
    percent === null ? {} : { 'aria-valuemin': 0, 'aria-valuemax': 100, 'aria-valuenow': percent };
  const heard = [percent !== null && `${percent} per cent`, activity].filter(Boolean).join(', ');
  return (
    <View style={{ gap: space(1), alignSelf: 'stretch' }}>
      <View
        role="progressbar"
        aria-label={label}
        {...known}
        aria-valuetext={heard || undefined}
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
            width: percent === null ? '100%' : `${percent}%`,
            opacity: percent === null ? 0.35 : 1,
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
          {percent !== null && (
            <Text size="small" tone="quiet" mono>
              {percent} %
            </Text>
          )}
        </View>
      )}
    </View>
  );
}
