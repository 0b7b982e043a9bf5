import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { Button } from '@/components/ui/Button';
import { count } from '@/components/ui/format';
import { Notice, ProblemNotice } from '@/components/ui/ProblemNotice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { placed, union } from '@/hooks/reading/placedMark';

const words = (marks: readonly { channel: number }[]): string =>
  `${count(marks.length, 'mark')} on ${count(new Set(marks.map((m) => m.channel)).size, 'channel')}`;

/** Both sides of a save that met a newer one, and the three ways on; nothing is sent or lost until one is taken. */
export function ConflictNotice() {
  const { reading } = useSession();
  const { conflict, marks } = reading.state;
  if (reading.status.kind === 'refused') return <ProblemNotice problem={reading.status.problem} />;
  if (!conflict) return null;
  const stored = placed(conflict.marks);
  const resolve = (keep: 'mine' | 'stored' | 'both') => () => reading.dispatch({ type: 'resolve', keep });
  return (
    <Notice kind="person" role="alert" title="Your marks were saved elsewhere meanwhile">
      <Text>
        {`Here: ${words(marks)}. Stored: ${words(stored)}. Together: ${words(union(marks, stored))}; where both have a mark, it stays where it is here.`}
      </Text>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(2), paddingTop: space(1) }}>
        <Button label="Keep both" kind="primary" onPress={resolve('both')} />
        <Button label="Keep mine" onPress={resolve('mine')} />
        <Button label="Take the stored ones" onPress={resolve('stored')} />
      </View>
    </Notice>
  );
}
