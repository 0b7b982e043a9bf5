import { View } from 'react-native';
import { Button } from './Button';
import { Text } from './Text';
import { space } from './tokens';

/** Rows of a long list that are shown at a time. */
export const PAGE = 50;

/** The pages there are, at least one. */
export const pagesOf = (total: number, size = PAGE): number => Math.max(1, Math.ceil(total / size));

/** The rows of one page; a page beyond the last shows the last. */
export function pageRows<T>(rows: readonly T[], page: number, size = PAGE): { rows: T[]; page: number } {
  const at = Math.min(Math.max(Math.floor(page) || 1, 1), pagesOf(rows.length, size));
  return { rows: rows.slice((at - 1) * size, at * size), page: at };
}

/** Which rows are shown, and the way to the others; nothing where all fit. */
export function Pager({
  total,
  page,
  size = PAGE,
  what,
  onPage,
}: {
  total: number;
  /** From 1. */
  page: number;
  size?: number;
  /** 'shells': what is counted. */
  what: string;
  onPage: (page: number) => void;
}) {
  const last = pagesOf(total, size);
  if (last === 1) return null;
  return (
    <View
      role="navigation"
      aria-label={`Pages of ${what}`}
      style={{
        flexDirection: 'row',
        alignItems: 'center',
        flexWrap: 'wrap',
        gap: space(2),
        paddingHorizontal: space(2),
      }}
    >
      <Button label="Previous" icon="back" disabled={page <= 1} onPress={() => onPage(page - 1)} />
      <Text mono role="status" size="small">
        {`${(page - 1) * size + 1}–${Math.min(page * size, total)} of ${total}`}
      </Text>
      <Button label="Next" icon="next" disabled={page >= last} onPress={() => onPage(page + 1)} />
    </View>
  );
}
