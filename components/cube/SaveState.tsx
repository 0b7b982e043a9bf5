import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { Button } from '@/components/ui/Button';
import { count } from '@/components/ui/format';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { space, type Colors } from '@/components/ui/tokens';
import type { SaveStatus } from '@/hooks/reading/readingState';
import type { IconName } from '@/components/ui/Icon';

/** Whether the marks are safe, in a few words. */
export function saveWords(
  status: SaveStatus,
  short: boolean,
): { text: string; icon: IconName | null; tone: keyof Colors } {
  switch (status.kind) {
    case 'loading':
      return { text: '', icon: null, tone: 'quiet' };
    case 'saved':
      return { text: short ? 'saved' : 'All marks saved', icon: 'check', tone: 'quiet' };
    case 'saving':
      return { text: 'saving', icon: null, tone: 'quiet' };
    case 'offline':
      return { text: `offline: ${status.waiting} waiting`, icon: 'caution', tone: 'person' };
    case 'conflict':
      return { text: 'two versions', icon: 'caution', tone: 'person' };
    case 'refused':
      return { text: 'not saved', icon: 'caution', tone: 'error' };
  }
}

export function SaveState({ short = false }: { short?: boolean }) {
  const { reading, shell, mayMark } = useSession();
  if (!shell) return null;
  if (!mayMark)
    return (
      <Text size="small" tone="quiet">
        looking only
      </Text>
    );
  const { text, icon, tone } = saveWords(reading.status, short);
  const changes =
    reading.status.kind === 'offline' ? `, ${count(reading.status.waiting, 'change')} not sent` : '';
  return (
    <View
      role="status"
      aria-live="polite"
      aria-label={text ? `Marks: ${text}${changes}` : undefined}
      testID="save-state"
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        gap: space(1),
        minWidth: short ? 0 : space(30),
        justifyContent: 'flex-end',
      }}
    >
      {icon && <Icon name={icon} size={14} tone={tone} />}
      <Text size="small" tone={tone} numberOfLines={1}>
        {text}
      </Text>
      {reading.status.kind === 'refused' && (
        <Button label="Try again" kind="quiet" onPress={() => reading.dispatch({ type: 'retry' })} />
      )}
    </View>
  );
}
