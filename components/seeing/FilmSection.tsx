import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { NumberSlider } from '@/components/seeing/NumberSlider';
import { CheckBox } from '@/components/ui/CheckBox';
import { Button } from '@/components/ui/Button';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** Playing through the channels, and comparing with another one or with the model. */
export function FilmSection() {
  const { film, seeing, channel, order, axes, wcs, model, view } = useSession();
  const { other, minus, change } = seeing;
  const speak = (c: number) => `${velocityLabel(wcs.velocityOf(c), axes.spectral.channelWidth)} km/s`;
  const at = (position: number) => order.channels[position] ?? 0;
  const chosen = typeof other === 'number' ? 'channel' : (other ?? 'none');
  return (
    <>
      <View style={{ flexDirection: 'row', gap: space(2), alignItems: 'center' }}>
        <Button
          label={film.playing ? 'Pause' : 'Play'}
          icon={film.playing ? 'pause' : 'play'}
          selected={film.playing}
          onPress={film.toggle}
        />
        <Text size="small" tone="quiet" style={{ flexShrink: 1 }}>
          {`Back and forth from ${speak(at(film.from))} to ${speak(at(film.to))}`}
        </Text>
      </View>
      <NumberSlider
        label="Channels a second"
        value={film.rate}
        low={1}
        high={film.mostRate}
        step={1}
        words={String(film.rate)}
        onChange={film.setRate}
      />
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(1) }}>
        <Button
          label="From here"
          onPress={() => film.setEnd('from')}
          style={{ paddingHorizontal: space(3) }}
        />
        <Button label="To here" onPress={() => film.setEnd('to')} style={{ paddingHorizontal: space(3) }} />
        <Button
          label="The model’s span"
          disabled={!model}
          onPress={film.modelSpan}
          style={{ paddingHorizontal: space(3) }}
        />
        <Button
          label="All"
          kind="quiet"
          disabled={film.whole}
          onPress={film.all}
          style={{ paddingHorizontal: space(3) }}
        />
      </View>
      <SegmentedChoice
        label="Compare with"
        value={chosen}
        options={[
          { value: 'none', label: 'nothing' },
          {
            value: 'channel',
            label: typeof other === 'number' ? `channel ${other + 1}` : 'this channel',
            disabled: view !== 'channel',
          },
          { value: 'model', label: 'the model', disabled: !model },
        ]}
        onChange={(to) =>
          change({
            other: to === 'channel' ? channel : to === 'model' ? 'model' : null,
            ...(to !== 'channel' && { minus: false }),
          })
        }
      />
      {chosen !== 'none' && (
        <Text size="small" tone="quiet">
          Hold the button on the map, or the F key, to flick between the two.
        </Text>
      )}
      {typeof other === 'number' && (
        <CheckBox
          label={`Show the difference with channel ${other + 1}`}
          showLabel
          checked={minus}
          onChange={(on) => change({ minus: on })}
        />
      )}
    </>
  );
}
