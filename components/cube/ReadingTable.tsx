import { View } from 'react-native';
import { MarkNext } from '@/components/cube/MarkNext';
import { useSession } from '@/components/cube/session';
import { Press, type PressState } from '@/components/ui/Press';
import { SectionTitle } from '@/components/ui/Panel';
import { HiddenText, Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, radius, space, touch } from '@/components/ui/tokens';
import type { ChannelReading } from '@/hooks/reading/skyMarks';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { formatQuantity } from '@/shared/physics/quantity';

/** Share of the radius below which its error is not one of reading. */
const LEAST_ERROR = 1e-4;

const REASONS = { 'too-few': 'too few', 'same-point': 'one point', 'straight-line': 'a line' } as const;

/** My reading by channel: velocity, how many marks, the ring they make. A row shows its channel. */
export function ReadingTable() {
  const { live, channel, showChannel, axes } = useSession();
  const most = Math.max(...live.readings.map((r) => r.marks), 1);
  return (
    <View style={{ gap: space(1) }}>
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline' }}>
        <SectionTitle>Your reading</SectionTitle>
        <Text size="small" tone="quiet">
          {live.readings.length > 0 ? 'km/s · marks · ring' : ''}
        </Text>
      </View>
      <View role="list" aria-label="Your reading by channel">
        {live.readings.map((r) => (
          <Row
            key={r.channel}
            reading={r}
            most={most}
            width={axes.spectral.channelWidth}
            current={r.channel === channel}
            onPress={showChannel}
          />
        ))}
      </View>
      <Text size="small" tone="quiet" role="status">
        {live.sentence}
      </Text>
      <MarkNext />
    </View>
  );
}

function Row(props: {
  reading: ChannelReading;
  most: number;
  /** Of a channel, km/s. */
  width: number;
  current: boolean;
  onPress: (channel: number) => void;
}) {
  const { reading, most, width, current, onPress } = props;
  const { color } = useTheme();
  const { ring } = reading;
  // marks made of one drawn circle do not scatter: their tiny error says nothing of the rim, so none is shown
  const se = ring?.se && ring.se > LEAST_ERROR * ring.theta ? ring.se : null;
  const q = ring && formatQuantity({ value: ring.theta, se, unit: 'deg' });
  return (
    <View role="listitem">
      <Press
        onPress={() => onPress(reading.channel)}
        {...(current && ({ 'aria-current': 'true' } as object))}
        style={({ hovered }: PressState) => ({
          flexDirection: 'row',
          alignItems: 'center',
          minHeight: touch,
          gap: space(2),
          paddingHorizontal: space(1),
          borderBottomWidth: hairline,
          borderBottomColor: color.line,
          backgroundColor: current || hovered ? color.selected : 'transparent',
        })}
      >
        <Text mono numberOfLines={1} style={{ minWidth: space(13) }} align="right">
          {velocityLabel(reading.velocity, width)}
          <HiddenText> km/s, </HiddenText>
        </Text>
        <View style={{ flex: 1, flexDirection: 'row', alignItems: 'center', gap: space(1.5) }}>
          <View style={{ flex: 1, alignItems: 'flex-end' }} aria-hidden>
            <View
              style={{
                height: space(1.5),
                width: `${Math.max((reading.marks / most) * 100, 6)}%`,
                borderRadius: radius.round,
                backgroundColor: color.person,
              }}
            />
          </View>
          <Text
            mono
            size="small"
            tone="quiet"
            align="right"
            style={{ minWidth: space(4), paddingRight: space(1) }}
          >
            {reading.marks}
            <HiddenText>{reading.marks === 1 ? ' mark, ' : ' marks, '}</HiddenText>
          </Text>
        </View>
        <View
          style={{ minWidth: space(23), flexDirection: 'row', justifyContent: 'flex-end', gap: space(1) }}
        >
          <HiddenText>{q ? 'ring ' : 'no ring: '}</HiddenText>
          {q ? (
            <>
              <Text mono>{`${q.value}${q.error ? '' : '°'}`}</Text>
              {q.error && (
                <Text mono size="small" tone="quiet" style={{ alignSelf: 'center' }}>
                  {q.error}
                </Text>
              )}
            </>
          ) : (
            <Text size="small" tone="quiet">
              {REASONS[reading.reason ?? 'too-few']}
            </Text>
          )}
        </View>
      </Press>
    </View>
  );
}
