import { View, type DimensionValue } from 'react-native';
import { useTheme } from './theme';
import { radius as radii, space } from './tokens';

/** The place of something that is on its way, of the size it will have. */
export function Skeleton({
  height = 16,
  width = '100%',
  round,
}: {
  height?: number;
  width?: DimensionValue;
  round?: boolean;
}) {
  const { color } = useTheme();
  return (
    <View
      aria-hidden
      style={{
        height,
        width,
        backgroundColor: color.chip,
        borderRadius: round ? radii.round : radii.small,
        opacity: 0.7,
      }}
    />
  );
}

/** Several lines of them, named once for a screen reader. */
export function SkeletonRows({
  rows = 4,
  height = 44,
  label = 'Loading',
}: {
  rows?: number;
  height?: number;
  label?: string;
}) {
  return (
    <View role="status" aria-label={label} aria-busy style={{ gap: space(2), alignSelf: 'stretch' }}>
      {Array.from({ length: rows }, (_, i) => (
        <Skeleton key={i} height={height} />
      ))}
    </View>
  );
}
