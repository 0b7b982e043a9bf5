import type { ReactNode } from 'react';
import { View, type ViewStyle } from 'react-native';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, radius, space } from './tokens';

export interface PanelProps {
  children: ReactNode;
  title?: ReactNode;
  /** At the right of the title: a count, a button. */
  aside?: ReactNode;
  level?: 2 | 3;
  /** Without inner space, for tables and images. */
  flush?: boolean;
  style?: ViewStyle;
}

/** A bordered surface with an optional heading. */
export function Panel({ children, title, aside, level = 2, flush, style }: PanelProps) {
  const { color } = useTheme();
  return (
    <View
      style={[
        {
          backgroundColor: color.panel,
          borderColor: color.line,
          borderWidth: hairline,
          borderRadius: radius.large,
          padding: flush ? 0 : space(4),
          gap: space(3),
        },
        flush && { overflow: 'hidden' },
        style,
      ]}
    >
      {title !== undefined && (
        <View
          style={[
            {
              flexDirection: 'row',
              alignItems: 'center',
              justifyContent: 'space-between',
              gap: space(3),
              flexWrap: 'wrap',
            },
            flush && { paddingHorizontal: space(4), paddingTop: space(3) },
          ]}
        >
          {typeof title === 'string' ? <SectionTitle level={level}>{title}</SectionTitle> : title}
          {aside}
        </View>
      )}
      {children}
    </View>
  );
}

export function SectionTitle({ children, level = 2 }: { children: ReactNode; level?: 2 | 3 }) {
  return (
    <Text heading={level} size="lead" weight="semibold">
      {children}
    </Text>
  );
}

/** The hairline between rows. */
export function Rule() {
  const { color } = useTheme();
  return <View style={{ height: hairline, backgroundColor: color.line, alignSelf: 'stretch' }} />;
}
