import type { Edge, TraceOutcome, TracedSector } from '@/shared/contract/traces';

export const edges: Record<Edge, { label: string; line: string }> = {
  ridge: {
    label: 'Ridge',
    line: 'The brightest line along the rim: what most people mark. Never mixed with the inner edge.',
  },
  inner: {
    label: 'Inner edge',
    line: 'Where the cavity ends: half a beam to a beam and more inside the ridge. Never mixed with it.',
  },
};

type Reason = NonNullable<TracedSector['rejected']>;
const reasons: Record<Reason, string> = {
  faint: 'does not stand above the noise',
  'at-end': 'highest at the end of the window',
  blank: 'blank pixels',
  outside: 'off the map',
};

/** Rejected sectors by reason, the most frequent first. */
export function rejections(
  sectors: readonly TracedSector[],
): { reason: Reason; words: string; sectors: number }[] {
  return (Object.keys(reasons) as Reason[])
    .map((reason) => ({
      reason,
      words: reasons[reason],
      sectors: sectors.filter((s) => s.rejected === reason).length,
    }))
    .filter((r) => r.sectors > 0)
    .sort((a, b) => b.sectors - a.sectors);
}

/** 'A rim was found in 62 % of the sectors: 94 of 152.' */
export function seenWords({ sectors, seen }: Pick<TraceOutcome, 'sectors' | 'seen'>): string {
  const found = sectors.filter((s) => s.rejected === null && s.radius !== null).length;
  return `A rim was found in ${Math.round(seen * 100)} % of the sectors: ${found} of ${sectors.length}.`;
}
