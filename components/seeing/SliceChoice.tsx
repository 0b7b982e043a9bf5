import { useSession } from '@/components/cube/session';
import { aboutOf } from '@/components/seeing/useSeenPicture';
import { firstSlice, SLICE_WORDS, type SliceKind } from '@/components/slices/slice';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';

const KINDS = Object.keys(SLICE_WORDS) as SliceKind[];

/** What is cut through velocity; a new slice begins about the model, or in the middle of the image. */
export function SliceChoice({ hideLabel }: { hideLabel?: boolean }) {
  const { seeing, model, wcs, axes } = useSession();
  const { slice, change } = seeing;
  const begin = (kind: SliceKind) => {
    const about = aboutOf('polar', wcs, axes, model);
    if (about) change({ slice: firstSlice(kind, about, model?.theta ?? null, about.reach) });
  };
  return (
    <SegmentedChoice
      small
      hideLabel={hideLabel}
      label="Slice through velocity"
      value={slice?.kind ?? 'none'}
      options={[
        { value: 'none', label: 'none' },
        ...KINDS.map((kind) => ({ value: kind, label: SLICE_WORDS[kind] })),
      ]}
      onChange={(kind) => (kind === 'none' ? change({ slice: null }) : begin(kind))}
    />
  );
}
