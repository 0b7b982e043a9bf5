import { useCallback, useMemo, useState } from 'react';
import type { PlacedMark } from '@/hooks/reading/placedMark';

export interface Selection {
  /** The selected marks of the channel shown. */
  chosen: readonly PlacedMark[];
  /** The one mark that is selected; null where there is none, or several. */
  selected: PlacedMark | null;
  select: (id: string | null, extend?: boolean) => void;
  selectMany: (ids: readonly string[]) => void;
}

/** Which marks are selected: only ever marks of the channel that is shown. */
export function useSelection(marks: readonly PlacedMark[], channel: number | null): Selection {
  const [ids, setIds] = useState<ReadonlySet<string>>(new Set());
  const select = useCallback(
    (id: string | null, extend = false) =>
      setIds((before) => {
        if (id === null) return extend ? before : new Set();
        if (!extend) return new Set([id]);
        const next = new Set(before);
        if (!next.delete(id)) next.add(id);
        return next;
      }),
    [],
  );
  const selectMany = useCallback((many: readonly string[]) => setIds(new Set(many)), []);
  const chosen = useMemo(
    () => marks.filter((m) => m.channel === channel && ids.has(m.id)),
    [marks, channel, ids],
  );
  const selected = chosen.length === 1 ? chosen[0]! : null;
  return { chosen, selected, select, selectMany };
}
