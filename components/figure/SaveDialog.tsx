import { useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import type { Choices, Kind } from '@/components/figure/choices';
import { captionOf } from '@/components/figure/figureOf';
import { LOOP_PX, loopChannels, sheetChannels } from '@/components/figure/makeFigure';
import { Preview } from '@/components/figure/Preview';
import { SheetSection } from '@/components/figure/SheetSection';
import { useSaving } from '@/components/figure/useSaving';
import { Button } from '@/components/ui/Button';
import { CheckBox } from '@/components/ui/CheckBox';
import { Dialog } from '@/components/ui/Dialog';
import { Field } from '@/components/ui/Field';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { ProgressBar } from '@/components/ui/ProgressBar';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { useRegion } from '@/hooks/useRegions';
import { COLUMN_MM, type Columns } from '@/shared/image/figure/figure';

const KINDS: { value: Kind; label: string }[] = [
  { value: 'picture', label: 'This picture' },
  { value: 'sheet', label: 'Channel sheet' },
  { value: 'loop', label: 'Loop' },
];

const FIRST: Choices = {
  kind: 'picture',
  columns: 1,
  ground: 'paper',
  part: 'seen',
  pick: 'even',
  count: 9,
  back: true,
  withCaption: true,
  caption: '',
};

/** What is seen as a file: for a paper, a talk, a message. */
export default function SaveDialog({ onClose }: { onClose: () => void }) {
  const s = useSession();
  const region = useRegion(s.cube.regionId).data?.name ?? null;
  const [given, setGiven] = useState<Choices>(() => ({
    ...FIRST,
    pick: s.live.readings.length > 1 ? 'marked' : 'even',
  }));
  /** null: the caption goes by the choices. */
  const [own, setOwn] = useState<string | null>(null);
  const edit = (more: Partial<Choices>) => setGiven((before) => ({ ...before, ...more }));
  const channels =
    given.kind === 'sheet' ? sheetChannels(s, given) : given.kind === 'loop' ? loopChannels(s) : null;
  const choices = { ...given, caption: own ?? captionOf(s, region, channels) };
  const saving = useSaving(s, choices);
  const { kind, columns } = choices;
  const asImaged = s.seen.lie === 'image';
  const nothing = channels?.length === 0 ? 'There are no channels to show: choose others.' : null;
  const many = kind !== 'picture' && !asImaged;
  const off = saving.under !== null || nothing !== null || many;
  const widths: { value: `${Columns}`; label: string }[] = ([1, 2] as const).map((n) => ({
    value: `${n}`,
    label:
      kind === 'loop'
        ? `${LOOP_PX[n]} pixels wide`
        : `${n === 1 ? 'One column' : 'Two columns'}, ${COLUMN_MM[n]} mm`,
  }));
  const buttons =
    kind === 'loop' ? (
      <Button
        kind="primary"
        icon="download"
        label="Save GIF"
        disabled={off}
        onPress={() => void saving.save('gif')}
      />
    ) : (
      <>
        <Button icon="download" label="Save SVG" disabled={off} onPress={() => void saving.save('svg')} />
        <Button
          kind="primary"
          icon="download"
          label="Save PNG"
          disabled={off}
          onPress={() => void saving.save('png')}
        />
      </>
    );
  return (
    <Dialog title="Save picture" onClose={onClose} actions={buttons} width={space(160)}>
      <SegmentedChoice label="What" value={kind} onChange={(k) => edit({ kind: k })} options={KINDS} />
      {!many && !nothing && (
        <Preview
          ask={saving.preview}
          asked={JSON.stringify([choices, s.channel, s.view, s.look.look.window, s.look.palette])}
        />
      )}
      {many && (
        <Text tone="quiet">
          Sheets and loops show the sky as imaged. Choose “As imaged” for the map first, under palette and
          window.
        </Text>
      )}
      {nothing && <Text tone="quiet">{nothing}</Text>}
      <SheetSection choices={choices} onChange={edit} />
      <SegmentedChoice
        label="Width"
        value={`${columns}`}
        onChange={(n) => edit({ columns: Number(n) as Columns })}
        options={widths}
      />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: space(6), rowGap: space(3) }}>
        <SegmentedChoice
          label="Ground"
          value={choices.ground}
          onChange={(ground) => edit({ ground })}
          options={[
            { value: 'paper', label: 'White' },
            { value: 'dome', label: 'Dark' },
          ]}
        />
        <SegmentedChoice
          label="Part"
          value={choices.part}
          onChange={(part) => edit({ part })}
          options={[
            { value: 'seen', label: 'As on the map' },
            { value: 'whole', label: 'Whole image' },
          ]}
        />
      </View>
      <CheckBox
        label="Caption below the picture"
        showLabel
        checked={choices.withCaption}
        onChange={(withCaption) => edit({ withCaption })}
      />
      {choices.withCaption && (
        <Field label="Caption" multiline value={choices.caption} onChangeText={setOwn} maxLength={2000} />
      )}
      <Text size="small" tone="quiet">
        {kind === 'loop'
          ? 'A loop has at most 256 colours; numbers are for figures, not for measuring.'
          : 'PNG has 600 dots an inch. SVG keeps marks, rings and letters as lines; its typeface is in the file, and programs that leave it out take another one without serifs.'}
      </Text>
      {saving.under && (
        <ProgressBar label="Saving" value={saving.under.share} activity={saving.under.words} />
      )}
      {saving.problem && <ProblemNotice problem={saving.problem} />}
      {saving.saved && (
        <Text role="status" size="small">
          Saved as {saving.saved}
        </Text>
      )}
    </Dialog>
  );
}
