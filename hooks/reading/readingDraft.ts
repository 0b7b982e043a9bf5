import type { PlacedMark } from '@/hooks/reading/placedMark';
import type { ReadingDraftCopy } from '@/hooks/reading/readingState';

/** Where unsaved marks wait in this browser: one place a person and shell, so that nobody takes over another's. */
export const draftKey = (personId: string, shellId: string): string =>
  `outswell.reading.${personId}.${shellId}`;

const isMark = (m: unknown): m is PlacedMark => {
  const mark = m as PlacedMark | null;
  return (
    typeof mark?.id === 'string' && [mark.channel, mark.x, mark.y].every((n) => Number.isFinite(n as number))
  );
};

/** The waiting marks; null where there are none, or what lies there cannot be read. */
export function readDraft(key: string): ReadingDraftCopy | null {
  try {
    const kept = JSON.parse(globalThis.localStorage?.getItem(key) ?? 'null') as ReadingDraftCopy | null;
    if (!kept || !Array.isArray(kept.marks) || !kept.marks.every(isMark)) return null;
    if (!Number.isInteger(kept.revision)) return null;
    const sent = Array.isArray(kept.sent) && kept.sent.every(isMark) ? kept.sent : null;
    return { marks: kept.marks, revision: kept.revision, sent };
  } catch {
    return null;
  }
}

/** Keep marks until they are saved; null forgets them. False where the browser keeps nothing. */
export function keepDraft(key: string, draft: ReadingDraftCopy | null): boolean {
  try {
    if (draft) globalThis.localStorage.setItem(key, JSON.stringify(draft));
    else globalThis.localStorage.removeItem(key);
    return true;
  } catch {
    return false;
  }
}
