import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { VIEWS } from '@/components/cube/views';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** The velocity shown, large; the channel beside it. */
export function Headline({ compact }: { compact?: boolean }) {
  const { velocity, channel, axes, view } = useSession();
  if (view !== 'channel')
    return (
      <Text size={compact ? 'lead' : 'display'} weight="semibold" numberOfLines={1}>
        {VIEWS[view].label}
      </Text>
    );
  return (
    <View
      style={{
        flexDirection: 'row',
        alignItems: compact ? 'baseline' : 'center',
        gap: space(2),
        flexShrink: 0,
      }}
    >
      <Text mono size={compact ? 'title' : 'display'} numberOfLines={1}>
        {velocityLabel(velocity, axes.spectral.channelWidth)}
      </Text>
      <View>
        <Text mono size="small" tone={compact ? 'quiet' : 'text'}>
          km/s
        </Text>
        {!compact && (
          <Text mono size="small" tone="quiet" numberOfLines={1}>
            {`channel ${channel + 1} of ${axes.channels}`}
          </Text>
        )}
      </View>
    </View>
  );
}
