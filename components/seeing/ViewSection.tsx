import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { VIEW_ORDER, VIEWS } from '@/components/cube/views';
import { LIE_WORDS, LIES, type Lie } from '@/components/seeing/seeing';
import { SecondChoice } from '@/components/seeing/SecondChoice';
import { SliceChoice } from '@/components/seeing/SliceChoice';
import { Button } from '@/components/ui/Button';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { separation } from '@/shared/sky/greatCircle';

const HINTS: Record<Lie, string> = {
  image: 'The projection of the file.',
  stereographic: 'Keeps every circle on the sky a circle, however wide the field.',
  polar: 'A ring about the centre becomes a straight line.',
  stacked: 'The model’s channels laid on each other, each scaled to its ring.',
};

/** The model's centre, give or take this share of the view's reach: live fits move a little. */
const NEAR = 2e-3;

/** Which picture, and how the sky lies in it. */
export function ViewSection() {
  const { view, setView, seen, seeing, lieAs, model } = useSession();
  const { about } = seeing;
  const centred =
    model !== null &&
    about !== null &&
    separation(about, { lon: model.l, lat: model.b }) < about.reach * NEAR;
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
          {`${HINTS[seen.lie]}${seen.lie === 'image' ? '' : centred ? ' About the model’s centre.' : model ? ' About another place than the model’s centre.' : ' About the middle of the image: there is no model yet.'}`}
        </Text>
        {seen.lie !== 'image' && model && !centred && (
          <Button
            label="Centre on the model"
            onPress={() => lieAs(seen.lie)}
            style={{ alignSelf: 'flex-start' }}
          />
        )}
      </View>
      <SliceChoice />
      <SecondChoice />
    </>
  );
}
