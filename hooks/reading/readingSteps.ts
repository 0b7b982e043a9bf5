import { sameMark, type PlacedMark } from '@/hooks/reading/placedMark';

/** What one step did to one mark: null before is an addition, null after a deletion. */
export interface Change {
  id: string;
  before: PlacedMark | null;
  after: PlacedMark | null;
  /** Where a deleted mark stood in the list, so that undo puts it back there. */
  index: number;
}

/** What undo takes back at once. A drag or a run of nudges is one step: its parts share a gesture. */
export interface Step {
  changes: readonly Change[];
  gesture: string | null;
}

export function applied(marks: readonly PlacedMark[], changes: readonly Change[]): PlacedMark[] {
  const next = [...marks];
  for (const { id, after, index } of changes) {
    const at = next.findIndex((mark) => mark.id === id);
    if (after && at >= 0) next[at] = after;
    else if (after) next.splice(Math.min(index, next.length), 0, after);
    else if (at >= 0) next.splice(at, 1);
  }
  return next;
}

/** The step that takes a step back. */
export const reversed = (step: Step): Step => ({
  gesture: null,
  changes: step.changes
    .map(({ id, before, after, index }) => ({ id, before: after, after: before, index }))
    .reverse(),
});

/** Put a step on the pile; the parts of one gesture become one step from its beginning to its end. */
export function stacked(pile: readonly Step[], step: Step, limit = 500): Step[] {
  const top = pile[pile.length - 1];
  if (!top || step.gesture === null || top.gesture !== step.gesture) return [...pile, step].slice(-limit);
  const merged = new Map(top.changes.map((change) => [change.id, change]));
  for (const change of step.changes) {
    const first = merged.get(change.id);
    merged.set(change.id, first ? { ...first, after: change.after } : change);
  }
  const changes = [...merged.values()].filter(
    ({ before, after }) => !before || !after || !sameMark(before, after), // a mark put back where it was
  );
  return changes.length > 0 ? [...pile.slice(0, -1), { gesture: step.gesture, changes }] : pile.slice(0, -1);
}

/** The changes that lead from one list of marks to another. */
export function difference(from: readonly PlacedMark[], to: readonly PlacedMark[]): Change[] {
  const after = new Map(to.map((mark) => [mark.id, mark]));
  const before = new Set(from.map((mark) => mark.id));
  const changes: Change[] = [];
  from.forEach((mark, index) => {
    const now = after.get(mark.id) ?? null;
    if (!now || !sameMark(mark, now)) changes.push({ id: mark.id, before: mark, after: now, index });
  });
  to.forEach((mark, index) => {
    if (!before.has(mark.id)) changes.push({ id: mark.id, before: null, after: mark, index });
  });
  return changes;
}
