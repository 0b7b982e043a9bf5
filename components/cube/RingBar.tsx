import { BarButton } from '@/components/cube/ToolBar';
import type { RingTool } from '@/components/cube/useRingTool';
import { IconButton } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { labelOf } from '@/shared/image/ticks';
import { MARKS, seenArcs, withMarks, type RingDraft } from '@/shared/shell/suggest/ringDraft';

/** The circle's numbers, and what becomes of it. */
export function RingBar({ draft, ring }: { draft: RingDraft; ring: RingTool }) {
  const seen = seenArcs(draft).reduce((sum, { from, to }) => sum + to - from, 0);
  const digits = Math.min(Math.max(Math.ceil(2 - Math.log10(Math.max(draft.theta, 1e-6))), 0), 5);
  return (
    <>
      <Text mono size="small" tone="onImage" style={{ paddingHorizontal: space(2) }}>
        {`Θ ${labelOf(draft.theta, digits)}°${seen < 360 ? ` · ${Math.round(seen)}° seen` : ''}`}
      </Text>
      <IconButton
        icon="minus"
        label="Fewer marks"
        tone="onImage"
        disabled={draft.marks <= MARKS.least}
        onPress={() => ring.change((d) => withMarks(d, d.marks - 1))}
      />
      <Text mono size="small" tone="onImage">{`${draft.marks} marks`}</Text>
      <IconButton
        icon="plus"
        label="More marks"
        tone="onImage"
        disabled={draft.marks >= MARKS.most}
        onPress={() => ring.change((d) => withMarks(d, d.marks + 1))}
      />
      <BarButton strong label="Place marks" disabled={seen === 0} onPress={ring.confirm} />
      <BarButton label="Cancel" onPress={ring.drop} />
    </>
  );
}
