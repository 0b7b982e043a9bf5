import type { ReactNode } from 'react';
import { View } from 'react-native';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, space } from './tokens';

export interface DefinitionRow {
  key: string;
  name: ReactNode;
  value: ReactNode;
  /** Small print under both: what was said of the number, what limits it. */
  note?: ReactNode;
}

/** Name and value, a line each: parameters, facts. */
export function DefinitionRows({ rows, dense }: { rows: readonly DefinitionRow[]; dense?: boolean }) {
  const { color } = useTheme();
  return (
    <View>
      {rows.map((row, i) => (
        <View
          key={row.key}
          style={{
            paddingVertical: space(1),
            borderBottomWidth: i === rows.length - 1 ? 0 : hairline,
            borderBottomColor: color.line,
          }}
        >
          <View
            style={{
              flexDirection: 'row',
              justifyContent: 'space-between',
              alignItems: 'center',
              columnGap: space(4),
              minHeight: dense ? space(5) : space(7),
            }}
          >
            {typeof row.name === 'string' ? (
              <Text tone={dense ? 'quiet' : 'text'}>{row.name}</Text>
            ) : (
              row.name
            )}
            <View style={{ flexShrink: 1, alignItems: 'flex-end' }}>
              {typeof row.value === 'string' ? (
                <Text mono align="right">
                  {row.value}
                </Text>
              ) : (
                row.value
              )}
            </View>
          </View>
          {row.note}
        </View>
      ))}
    </View>
  );
}
