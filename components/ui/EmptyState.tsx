import type { ReactNode } from 'react';
import { View } from 'react-native';
import { Icon, type IconName } from './Icon';
import { Text } from './Text';
import { layout, space } from './tokens';

/** Nothing here yet, and what to do next. */
export function EmptyState({
  icon,
  title,
  children,
  action,
  level = 2,
}: {
  icon?: IconName;
  title: string;
  children?: ReactNode;
  action?: ReactNode;
  level?: 1 | 2 | 3;
}) {
  return (
    <View
      style={{ alignItems: 'center', gap: space(2), paddingVertical: space(8), paddingHorizontal: space(4) }}
    >
      {icon && <Icon name={icon} size={32} tone="quiet" />}
      <Text heading={level} size="lead" weight="semibold" align="center">
        {title}
      </Text>
      {children && (
        <Text tone="quiet" align="center" style={{ maxWidth: layout.dialog }}>
          {children}
        </Text>
      )}
      {action && <View style={{ paddingTop: space(2) }}>{action}</View>}
    </View>
  );
}
