import { View } from 'react-native';
import { Icon } from '../ui/Icon';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { radius, space } from '../ui/tokens';

/** Covers the page while files hover over it. */
export function DropCurtain({ regionName }: { regionName: string }) {
  const { color } = useTheme();
  return (
    <View
      pointerEvents="none"
      style={{
        position: 'fixed' as 'absolute',
        top: 0,
        left: 0,
        right: 0,
        bottom: 0,
        zIndex: 30,
        padding: space(5),
        backgroundColor: color.scrim,
      }}
    >
      <View
        style={{
          flex: 1,
          alignItems: 'center',
          justifyContent: 'center',
          gap: space(3),
          borderRadius: radius.large,
          borderWidth: space(0.5),
          borderStyle: 'dashed',
          borderColor: color.person,
          backgroundColor: color.panel,
        }}
      >
        <Icon name="upload" size={40} tone="person" />
        <Text size="title" weight="semibold" align="center">
          Drop to upload into {regionName}
        </Text>
      </View>
    </View>
  );
}
