import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { VIEW_ORDER, VIEWS } from '@/components/cube/views';
import { LIE_WORDS, LIES, type Lie } from '@/components/seeing/seeing';
import { SecondChoice } from '@/components/seeing/SecondChoice';
import { SliceChoice } from '@/components/seeing/SliceChoice';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';

const HINTS: Record<Lie, string> = {
  image: 'The projection of the file.',
  stereographic: 'Keeps every circle on the sky a circle, however wide the field.',
  polar: 'A ring about the centre becomes a straight line.',
  stacked: 'The model’s channels laid on each other, each scaled to its ring.',
};

/** Which picture, and how the sky lies in it. */
export function ViewSection() {
  const { view, setView, seen, lieAs, model } = useSession();
  return (
    <>
      <SegmentedChoice
        small
        label="Picture"
        value={view}
        options={VIEW_ORDER.map((v) => ({ value: v, label: VIEWS[v].label }))}
        onChange={setView}
      />
      <View style={{ gap: space(1) }}>
        <SegmentedChoice
          small
          label="How the sky lies"
          value={seen.lie}
          options={LIES.map((lie) => ({
            value: lie,
            label: LIE_WORDS[lie].label,
            disabled: lie === 'stacked' && (!model || view !== 'channel'),
          }))}
          onChange={lieAs}
        />
        <Text size="small" tone="quiet">
          {`${HINTS[seen.lie]}${seen.lie === 'image' ? '' : model ? ' About the model’s centre.' : ' About the middle of the image: there is no model yet.'}`}
        </Text>
      </View>
      <SliceChoice />
      <SecondChoice />
    </>
  );
}
