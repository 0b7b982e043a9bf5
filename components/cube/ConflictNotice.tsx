import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { Button } from '@/components/ui/Button';
import { count } from '@/components/ui/format';
import { Notice, ProblemNotice } from '@/components/ui/ProblemNotice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { placed, sameMark, union, type PlacedMark } from '@/hooks/reading/placedMark';
import { velocityLabel } from '@/shared/image/velocityDigits';

const MOST_ROWS = 6;
const words = (marks: readonly { channel: number }[]): string =>
  `${count(marks.length, 'mark')} on ${count(new Set(marks.map((m) => m.channel)).size, 'channel')}`;

/** One version by channel: how many marks, and how many of them the other has otherwise or not at all. */
function Side(props: {
  title: string;
  marks: readonly PlacedMark[];
  against: readonly PlacedMark[];
  /** Of a channel, km/s. */
  width: number;
  of: (channel: number) => number;
}) {
  const { title, marks, against, width, of } = props;
  const other = new Map(against.map((mark) => [mark.id, mark]));
  const channels = [...new Set([...marks, ...against].map((mark) => mark.channel))].sort((a, b) => a - b);
  const rows = channels.map((channel) => {
    const own = marks.filter((mark) => mark.channel === channel);
    const differing = own.filter((mark) => {
      const there = other.get(mark.id);
      return !there || !sameMark(mark, there);
    });
    return { channel, own: own.length, differing: differing.length };
  });
  const telling = rows.filter((row) => row.differing > 0);
  return (
    <View role="group" aria-label={`${title}: ${words(marks)}`} style={{ flexGrow: 1, flexBasis: space(40) }}>
      <Text weight="semibold">{`${title}: ${words(marks)}`}</Text>
      {telling.slice(0, MOST_ROWS).map((row) => (
        <Text key={row.channel} mono size="small">
          {`${velocityLabel(of(row.channel), width)} km/s: ${row.own}, ${row.differing} of them differ`}
        </Text>
      ))}
      {telling.length > MOST_ROWS && (
        <Text size="small">{`and ${telling.length - MOST_ROWS} more channels`}</Text>
      )}
    </View>
  );
}

/** Both sides of a save that met a newer one, and the three ways on; nothing is sent or lost until one is taken. */
export function ConflictNotice() {
  const { reading, axes, wcs } = useSession();
  const { conflict, marks } = reading.state;
  if (reading.status.kind === 'refused') return <ProblemNotice problem={reading.status.problem} />;
  if (!conflict) return null;
  const stored = placed(conflict.marks);
  const resolve = (keep: 'mine' | 'stored' | 'both') => () => reading.dispatch({ type: 'resolve', keep });
  return (
    <Notice kind="person" role="alert" title="Your marks were saved elsewhere meanwhile">
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(3) }}>
        <Side
          title="Here"
          marks={marks}
          against={stored}
          width={axes.spectral.channelWidth}
          of={wcs.velocityOf}
        />
        <Side
          title="Stored"
          marks={stored}
          against={marks}
          width={axes.spectral.channelWidth}
          of={wcs.velocityOf}
        />
      </View>
      <Text size="small">
        {`On the map the stored ones of this channel are squares. Together: ${words(union(marks, stored))}; where both have a mark, it stays as it is here.`}
      </Text>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2), paddingTop: space(1) }}>
        <Button label="Keep both" kind="primary" onPress={resolve('both')} />
        <Button label="Keep mine" onPress={resolve('mine')} />
        <Button label="Take the stored ones" onPress={resolve('stored')} />
      </View>
    </Notice>
  );
}
