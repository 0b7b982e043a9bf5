import { useEffect, useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { NumberSlider } from '@/components/seeing/NumberSlider';
import { angleWords, MOST_MEAN } from '@/components/seeing/seeing';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { labelOf } from '@/shared/image/ticks';

/** Several channels as one, smoothing to a beam, and taking a wide smoothing off. */
export function SmoothSection() {
  const { seeing, axes, order, view } = useSession();
  const { mean, beam, less, change } = seeing;
  const { channelWidth } = axes.spectral;
  const most = Math.min(MOST_MEAN, 2 * Math.floor((order.channels.length - 1) / 2) + 1);
  const own = (axes.beam?.major ?? 0) * 60;
  const plain = mean === 1 && beam === null && less === null;
  return (
    <>
      <NumberSlider
        label="Channels averaged"
        value={mean}
        low={1}
        high={most}
        step={2}
        words={mean === 1 ? 'one' : `${mean} · ${labelOf(mean * channelWidth, 1)} km/s`}
        onChange={(n) => change({ mean: n })}
      />
      {view !== 'channel' && (
        <Text size="small" tone="quiet">
          A map of all channels has none to average.
        </Text>
      )}
      <View style={{ flexDirection: 'row', gap: space(3) }}>
        <ArcminField
          label="Smooth to a beam of"
          value={beam}
          low={own}
          problem={`At least the beam there is, ${angleWords(own)}.`}
          onChange={(v) => change({ beam: v })}
        />
        <ArcminField
          label="Less smoothing to"
          value={less}
          low={0}
          problem="More than 0."
          onChange={(v) => change({ less: v })}
        />
      </View>
      <Text size="small" tone="quiet">
        {`Widths are full, at half maximum.${axes.beam ? ` The file’s beam is ${angleWords(own)}.` : ' The file names no beam: smoothing is done in full.'} Taking a wide smoothing off lets faint rims stand out; its numbers are no brightness any more.`}
      </Text>
      <Button
        label="As it is"
        kind="quiet"
        disabled={plain}
        onPress={() => change({ mean: 1, beam: null, less: null })}
        style={{ alignSelf: 'flex-start' }}
      />
    </>
  );
}

/** A width in arcminutes; empty for none. */
function ArcminField({
  label,
  value,
  low,
  problem,
  onChange,
}: {
  label: string;
  value: number | null;
  low: number;
  problem: string;
  onChange: (value: number | null) => void;
}) {
  const shown = value === null ? '' : String(value);
  const [text, setText] = useState(shown);
  const [wrong, setWrong] = useState(false);
  useEffect(() => {
    setText(shown);
    setWrong(false);
  }, [shown]);
  const take = () => {
    if (text === shown) return;
    if (text.trim() === '') return onChange(null);
    const number = Number(text.replace(',', '.'));
    const holds = number > low && number <= 6000;
    setWrong(!holds);
    if (holds) onChange(number);
  };
  return (
    <View style={{ flex: 1 }}>
      <Field
        label={label}
        unit="′"
        mono
        inputMode="decimal"
        value={text}
        onChangeText={setText}
        onBlur={take}
        onSubmitEditing={take}
        problem={wrong ? problem : null}
      />
    </View>
  );
}
