import type { ReactNode } from 'react';
import { ScrollView, View, type ViewStyle } from 'react-native';
import { Icon } from './Icon';
import { Press, type PressState } from './Press';
import { Text } from './Text';
import { useTheme } from './theme';
import { hairline, space, touch } from './tokens';

export interface Column<Row> {
  key: string;
  /** Read out as the column's name; `head` draws it where text is not enough. */
  label: string;
  head?: ReactNode;
  align?: 'left' | 'right';
  /** Least width in px; the rest of the row is shared by `grow`. */
  width: number;
  grow?: number;
  cell: (row: Row, index: number) => ReactNode;
  sortable?: boolean;
}

export interface TableProps<Row> {
  label: string;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  sort?: { key: string; order: 'up' | 'down' };
  onSort?: (key: string) => void;
  selected?: (row: Row) => boolean;
  dense?: boolean;
}

const cellStyle = (column: { align?: 'left' | 'right'; width: number; grow?: number }): ViewStyle => ({
  width: column.width,
  flexBasis: column.width,
  flexGrow: column.grow ?? (column.align === 'right' ? 0 : 1),
  flexShrink: 0,
  paddingHorizontal: space(2),
  paddingVertical: space(0.5),
  alignItems: column.align === 'right' ? 'flex-end' : 'flex-start',
  justifyContent: 'center',
});

/** A table for eyes, ears and keys; wider than its place, it scrolls sideways by itself. */
export function Table<Row>({ label, columns, rows, rowKey, sort, onSort, selected, dense }: TableProps<Row>) {
  const { color } = useTheme();
  const minWidth = columns.reduce((sum, c) => sum + c.width, 0);
  const ariaSort = (key: string, sortable?: boolean) =>
    (!sortable
      ? {}
      : {
          'aria-sort': sort?.key !== key ? 'none' : sort.order === 'up' ? 'ascending' : 'descending',
        }) as object;
  const scroller = { tabIndex: 0, role: 'region', 'aria-label': `${label}, scrolls sideways` } as object;
  return (
    <ScrollView
      horizontal
      {...scroller}
      style={{ alignSelf: 'stretch' }}
      contentContainerStyle={{ flexGrow: 1, minWidth }}
    >
      <View role="table" aria-label={label} style={{ flexGrow: 1, minWidth }}>
        <View role={'rowgroup' as 'row'}>
          <View
            role="row"
            style={{
              flexDirection: 'row',
              minHeight: touch,
              borderBottomWidth: hairline,
              borderBottomColor: color.line,
            }}
          >
            {columns.map((c) => (
              <View
                key={c.key}
                role={'columnheader' as 'row'}
                {...ariaSort(c.key, c.sortable)}
                style={cellStyle(c)}
              >
                {c.sortable && onSort ? (
                  <Press
                    onPress={() => onSort(c.key)}
                    style={({ hovered }: PressState) => ({
                      minHeight: touch,
                      flexDirection: 'row',
                      alignItems: 'center',
                      gap: space(1),
                      opacity: hovered ? 0.92 : 1,
                    })}
                  >
                    {typeof c.head === 'undefined' ? (
                      <HeadText active={sort?.key === c.key}>{c.label}</HeadText>
                    ) : (
                      c.head
                    )}
                    {sort?.key === c.key && (
                      <Icon name={sort.order === 'up' ? 'up' : 'down'} size={12} tone="quiet" />
                    )}
                  </Press>
                ) : (
                  (c.head ?? <HeadText>{c.label}</HeadText>)
                )}
              </View>
            ))}
          </View>
        </View>
        <View role={'rowgroup' as 'row'}>
          {rows.map((row, i) => (
            <View
              key={rowKey(row)}
              role="row"
              {...(selected && ({ 'aria-selected': selected(row) } as object))}
              style={{
                flexDirection: 'row',
                minHeight: dense ? space(9) : touch + space(1),
                borderBottomWidth: i === rows.length - 1 ? 0 : hairline,
                borderBottomColor: color.line,
                backgroundColor: selected?.(row) ? color.selected : 'transparent',
              }}
            >
              {columns.map((c) => (
                <View key={c.key} role={'cell' as 'row'} style={cellStyle(c)}>
                  {c.cell(row, i)}
                </View>
              ))}
            </View>
          ))}
        </View>
      </View>
    </ScrollView>
  );
}

export function HeadText({ children, active }: { children: ReactNode; active?: boolean }) {
  return (
    <Text size="small" tone={active ? 'text' : 'quiet'} weight="semibold" numberOfLines={1}>
      {children}
    </Text>
  );
}
