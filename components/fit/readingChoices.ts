import type { Shell } from '@/shared/contract/shells';
import type { Trace } from '@/shared/contract/traces';
import { ago, count } from '../ui/format';
import { edges } from './traceWords';

/**
 * What this person can fit: their own marks, and rims traced from the brightness. A fit that is run again may be of
 * somebody else's marks: those stay in the list then.
 */
export function readingChoices(
  shell: Pick<Shell, 'readings'>,
  traces: readonly Trace[],
  chosen: string | null,
): { value: string; label: string }[] {
  const traced = traces.filter((t) => t.readingId !== null);
  const tracedIds = new Set(traced.map((t) => t.readingId));
  const marks = shell.readings
    .filter((r) => !tracedIds.has(r.id) && (r.mine || r.id === chosen))
    .map((r) => ({
      value: r.id,
      label: `${r.mine ? 'My marks' : `Marks of ${r.person.name}`}: ${count(r.marks, 'mark')} on ${count(r.channels, 'channel')}`,
    }));
  const known = (id: string) => tracedIds.has(id) || marks.some((m) => m.value === id);
  return [
    // marks that were saved a moment ago are not in the list of the shell yet
    ...(chosen !== null && !known(chosen) ? [{ value: chosen, label: 'My marks' }] : []),
    ...marks,
    ...traced.map((t) => ({
      value: t.readingId!,
      label: `Traced rim: ${edges[t.edge].label.toLowerCase()}, ${ago(t.createdAt)}`,
    })),
  ];
}
