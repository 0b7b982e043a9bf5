import type { ReactNode } from 'react';
import { View } from 'react-native';
import { Button } from './Button';
import { Icon, type IconName } from './Icon';
import { Text } from './Text';
import { useTheme } from './theme';
import { radius, space, type Colors } from './tokens';

/** What hooks/api.ts throws, or any problem kept on a record. */
export interface ProblemLike {
  title: string;
  detail?: string;
  card?: string;
  field?: string;
}

/** An error where it was caused: what happened, what to do, and a way to try again. */
export function ProblemNotice({
  problem,
  onRetry,
  retryLabel = 'Try again',
  busy,
  children,
}: {
  problem: ProblemLike;
  onRetry?: () => void;
  retryLabel?: string;
  busy?: boolean;
  children?: ReactNode;
}) {
  return (
    <Notice kind="error" title={problem.title} role="alert">
      {problem.detail && <Text tone="text">{problem.detail}</Text>}
      {problem.card && (
        <Text tone="quiet" size="small">
          Header card{' '}
          <Text mono size="small">
            {problem.card}
          </Text>
        </Text>
      )}
      {(onRetry || children) && (
        <View style={{ flexDirection: 'row', gap: space(2), flexWrap: 'wrap', paddingTop: space(1) }}>
          {onRetry && <Button label={retryLabel} icon="retry" onPress={onRetry} busy={busy} />}
          {children}
        </View>
      )}
    </Notice>
  );
}

const kinds: Record<'error' | 'person' | 'model' | 'plain', { edge: keyof Colors; icon: IconName }> = {
  error: { edge: 'error', icon: 'caution' },
  person: { edge: 'person', icon: 'caution' },
  model: { edge: 'model', icon: 'info' },
  plain: { edge: 'control', icon: 'info' },
};

/** A remark with a coloured edge, as beside a number it limits. */
export function Notice({
  kind = 'plain',
  title,
  children,
  role,
}: {
  kind?: keyof typeof kinds;
  title?: string;
  children?: ReactNode;
  role?: 'alert' | 'status';
}) {
  const { color } = useTheme();
  const look = kinds[kind];
  return (
    <View
      role={role}
      style={{
        flexDirection: 'row',
        gap: space(3),
        padding: space(3),
        backgroundColor: color.raised,
        borderLeftWidth: space(1),
        borderLeftColor: color[look.edge],
        borderRadius: radius.small,
      }}
    >
      <Icon name={look.icon} size={20} tone={look.edge === 'control' ? 'quiet' : look.edge} />
      <View style={{ flex: 1, gap: space(1), minWidth: 0 }}>
        {title && <Text weight="semibold">{title}</Text>}
        {typeof children === 'string' ? <Text>{children}</Text> : children}
      </View>
    </View>
  );
}
