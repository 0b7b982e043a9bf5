import { View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, inset, layout, radius, space } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';

/** A small card at the lower edge: it can be left where it is, and nothing waits for an answer. */
export function GuideOffer({ onBegin, onRefuse }: { onBegin: () => void; onRefuse: () => void }) {
  const { color } = useTheme();
  const { wide } = useWide();
  return (
    <View
      role="region"
      aria-label="Guide"
      style={{
        position: 'fixed' as 'absolute',
        right: inset('right', space(3)),
        left: wide ? undefined : inset('left', space(3)),
        bottom: inset('bottom', wide ? space(4) : layout.tabBar + space(2)),
        maxWidth: space(90),
        zIndex: 30,
        gap: space(2),
        padding: space(3),
        borderRadius: radius.large,
        borderWidth: hairline,
        borderColor: color.control,
        backgroundColor: color.raised,
        boxShadow: `0 ${space(1)}px ${space(5)}px ${color.shadow}`,
      }}
    >
      <Text>New here? Five short cards show how a shell gets from a cube into the catalogue.</Text>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2), justifyContent: 'flex-end' }}>
        <Button kind="quiet" label="No, thanks" onPress={onRefuse} />
        <Button kind="primary" label="Show me around" onPress={onBegin} />
      </View>
    </View>
  );
}
