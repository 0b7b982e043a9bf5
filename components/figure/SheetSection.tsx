import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { PANEL_COUNTS, type Choices } from '@/components/figure/choices';
import { loopChannels, sheetChannels } from '@/components/figure/makeFigure';
import { count } from '@/components/ui/format';
import { CheckBox } from '@/components/ui/CheckBox';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Select } from '@/components/ui/Select';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** Which channels a sheet or a loop takes. */
export function SheetSection({
  choices,
  onChange,
}: {
  choices: Choices;
  onChange: (more: Partial<Choices>) => void;
}) {
  const s = useSession();
  const { kind } = choices;
  if (kind === 'picture') return null;
  const channels = kind === 'sheet' ? sheetChannels(s, choices) : loopChannels(s);
  const v = (channel: number | undefined) =>
    channel === undefined ? '' : velocityLabel(s.wcs.velocityOf(channel), s.axes.spectral.channelWidth);
  const span =
    channels.length > 0
      ? `${count(channels.length, 'channel')}, ${v(channels[0])} to ${v(channels[channels.length - 1])} km/s`
      : 'No channels';
  return (
    <View style={{ gap: space(3) }}>
      {kind === 'sheet' && (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'flex-end', gap: space(3) }}>
          <SegmentedChoice
            label="Channels"
            value={choices.pick}
            onChange={(pick) => onChange({ pick })}
            options={[
              { value: 'marked', label: 'With marks', disabled: s.live.readings.length === 0 },
              { value: 'even', label: 'Evenly spread' },
            ]}
          />
          {choices.pick === 'even' && (
            <Select
              label="How many"
              value={`${choices.count}`}
              onChange={(n) => onChange({ count: Number(n) })}
              options={PANEL_COUNTS.map((n) => ({ value: `${n}`, label: `${n}` }))}
            />
          )}
        </View>
      )}
      {kind === 'loop' && (
        <CheckBox
          label="There and back again"
          showLabel
          checked={choices.back}
          onChange={(back) => onChange({ back })}
        />
      )}
      <Text size="small" tone="quiet">
        {`${span}.`}
        {choices.pick === 'even' || kind === 'loop'
          ? ` They lie between the ends that playing has${kind === 'loop' ? `, ${s.film.rate} a second` : ''}.`
          : ''}
      </Text>
    </View>
  );
}
