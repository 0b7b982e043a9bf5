import type { PlacedMark } from '@/hooks/reading/placedMark';
import type { Step } from '@/hooks/reading/readingSteps';

/** Undo and redo as they lie in the browser, with the marks they lead from: on any others they mean nothing. */
export interface ReadingHistory {
  marks: readonly PlacedMark[];
  undo: readonly Step[];
  redo: readonly Step[];
}

/** One place a person and shell. */
export const historyKey = (personId: string, shellId: string): string =>
  `outswell.history.${personId}.${shellId}`;

/** The browser gives a page a few megabytes for everything; the oldest steps go first. */
const MOST_STEPS = 200;
const MOST_CHARACTERS = 400_000;

const isStep = (value: unknown): value is Step => {
  const changes = (value as Step | null)?.changes;
  return (
    Array.isArray(changes) && changes.every((c) => typeof c?.id === 'string' && Number.isInteger(c.index))
  );
};

/** The history kept here; null where there is none, or what lies there cannot be read. */
export function readHistory(key: string): ReadingHistory | null {
  try {
    const kept = JSON.parse(globalThis.localStorage?.getItem(key) ?? 'null') as ReadingHistory | null;
    if (!kept || ![kept.marks, kept.undo, kept.redo].every(Array.isArray)) return null;
    return [...kept.undo, ...kept.redo].every(isStep) ? kept : null;
  } catch {
    return null;
  }
}

/** Keep the history, as much of it as there is room for; where the browser keeps nothing, undo ends with the page. */
export function keepHistory(key: string, { marks, undo, redo }: ReadingHistory): void {
  try {
    if (undo.length + redo.length === 0) return globalThis.localStorage.removeItem(key);
    for (let steps = MOST_STEPS; steps >= 1; steps >>= 1) {
      const text = JSON.stringify({ marks, undo: undo.slice(-steps), redo: redo.slice(-steps) });
      if (text.length > MOST_CHARACTERS && steps > 1) continue;
      return globalThis.localStorage.setItem(key, text);
    }
  } catch {
    // full, or forbidden by the person
  }
}
