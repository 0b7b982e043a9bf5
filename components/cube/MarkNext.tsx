import { useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { WHERE_NEXT } from '@/shared/shell/suggest/whereNext';

const percent = (share: number) => `${Math.round(100 * Math.max(share, 0))} %`;

/** The channel where a ring would tell most, and why. */
export function MarkNext() {
  const { next, showChannel, axes, channel } = useSession();
  const [open, setOpen] = useState(false);
  const [best] = next;
  if (!best) return null;
  const velocity = velocityLabel(best.velocity, axes.spectral.channelWidth);
  return (
    <View style={{ gap: space(1) }}>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space(2) }}>
        <Text weight="semibold" style={{ flexShrink: 1 }}>
          {`Mark next: channel ${best.channel + 1} (v = ${velocity} km/s)`}
        </Text>
        <Button
          label="Show it"
          aria-label={`Show it: channel ${best.channel + 1}, where marks would help most`}
          disabled={best.channel === channel}
          onPress={() => showChannel(best.channel)}
        />
      </View>
      <Text size="small" tone="quiet">
        {`A ring there would lessen the variance of ln v_exp by ${percent(best.expansion)}, of the centre by ${percent(best.centre)}. Diamonds on the strip show where else.`}
      </Text>
      <Button
        kind="quiet"
        label={open ? 'Hide how this is reckoned' : 'How this is reckoned'}
        aria-expanded={open}
        onPress={() => setOpen(!open)}
      />
      {open && (
        <Text size="small" tone="quiet">
          {WHERE_NEXT}
        </Text>
      )}
    </View>
  );
}
