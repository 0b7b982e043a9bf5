import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { brightness } from '@/components/cube/words';
import { VIEWS } from '@/components/cube/views';
import { IconButton } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space } from '@/components/ui/tokens';

/** Over a map of all channels: what it is, why nothing can be marked on it, and the way back. */
export function ViewNote() {
  const { view, setView, mayMark, shell, planes } = useSession();
  const { color } = useTheme();
  if (view === 'channel') return null;
  // which values weigh in matters where they are averaged; its reason, after the colon, is too long for a corner
  const mask = view === 'velocity' || view === 'dispersion' ? planes.plane?.mask?.split(':')[0] : null;
  const masked = mask?.replace(/\d+(\.\d+)?(e[+-]?\d+)?/i, (number) => brightness(Number(number)));
  return (
    <View
      style={{
        position: 'absolute',
        left: space(2),
        top: space(2),
        flexDirection: 'row',
        alignItems: 'center',
        paddingLeft: space(3),
        maxWidth: '60%', // the readout has the other corner
        borderRadius: radius.small,
        backgroundColor: color.image,
      }}
    >
      <View style={{ flexShrink: 1, paddingVertical: space(1) }}>
        <Text size="small" tone="onImage" weight="semibold">
          {`${VIEWS[view].label}, all channels`}
        </Text>
        {masked && (
          <Text size="small" tone="onImage">
            {`From ${masked}`}
          </Text>
        )}
        {mayMark && shell && (
          <Text size="small" tone="onImage">
            Marks go on channels.
          </Text>
        )}
      </View>
      <IconButton
        icon="close"
        label="Back to the channel"
        tone="onImage"
        onPress={() => setView('channel')}
      />
    </View>
  );
}
