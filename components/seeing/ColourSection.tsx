import { useEffect, useMemo, useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import type { View as Shown } from '@/components/cube/views';
import { WindowSlider } from '@/components/cube/WindowSlider';
import { trackRange } from '@/components/cube/windowScale';
import { brightness } from '@/components/cube/words';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Text } from '@/components/ui/Text';
import { radius, space } from '@/components/ui/tokens';
import { cssGradient, PALETTES } from '@/shared/image/palettes';
import { TONES } from '@/shared/image/tone';
import { windowOf } from '@/shared/image/windowPresets';

const SHARES = [
  { label: 'All', share: 1 },
  { label: '99.8 %', share: 0.998 },
  { label: '99 %', share: 0.99 },
  { label: '95 %', share: 0.95 },
];

/** Maps of velocities, whose window is none of brightness. */
const KM_S: ReadonlySet<Shown> = new Set(['velocity', 'dispersion']);

/** Palette, tone and brightness window. */
export function ColourSection() {
  const { look, channelsLook, planes, cube, view, unit } = useSession();
  const gradient = useMemo(() => cssGradient(look.palette), [look.palette]);
  const [lowest, highest] = useMemo(() => {
    if (channelsLook) return [cube.statistics?.minimum ?? null, cube.statistics?.maximum ?? null];
    return (planes.plane && windowOf(planes.plane, 1)) ?? [null, null];
  }, [channelsLook, cube.statistics, planes.plane]);
  const range = trackRange(look.window, lowest, highest);
  const preset = (share: number) => {
    const found = planes.plane && windowOf(planes.plane, share);
    if (found) look.setWindow(found);
  };
  return (
    <>
      <SegmentedChoice
        label="Palette"
        value={look.palette}
        options={PALETTES.map((p) => ({ value: p, label: p }))}
        onChange={look.setPalette}
      />
      <View
        aria-hidden
        style={{ height: space(2), borderRadius: radius.small, backgroundImage: gradient } as object}
      />
      <SegmentedChoice
        label="Tone"
        value={look.tone}
        options={TONES.map((t) => ({ value: t, label: t }))}
        onChange={look.setTone}
      />
      <View style={{ gap: space(1) }}>
        <Text size="small" tone="quiet" weight="semibold">
          {`${KM_S.has(view) ? 'Window' : 'Brightness window'}${unit ? `, ${unit}` : ''}`}
        </Text>
        <WindowSlider
          window={look.window}
          range={range}
          unit={unit}
          gradient={gradient}
          onChange={look.setWindow}
        />
        <View style={{ flexDirection: 'row', gap: space(3) }}>
          <EndField end={0} />
          <EndField end={1} />
        </View>
      </View>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space(1) }}>
        {SHARES.map(({ label, share }) => (
          <Button
            key={label}
            label={label}
            aria-label={
              share === 1
                ? 'All of this picture between the ends of the window'
                : `Window of ${label} of this picture`
            }
            disabled={!planes.plane}
            onPress={() => preset(share)}
            style={{ paddingHorizontal: space(3) }}
          />
        ))}
        <Button
          label="Reset"
          kind="quiet"
          disabled={look.usual}
          onPress={() => look.setWindow(null)}
          style={{ paddingHorizontal: space(3) }}
        />
      </View>
    </>
  );
}

function EndField({ end }: { end: 0 | 1 }) {
  const { look, view } = useSession();
  const shown = brightness(look.window[end]);
  const [text, setText] = useState(shown);
  const [wrong, setWrong] = useState<string | null>(null);
  useEffect(() => {
    setText(shown);
    setWrong(null);
  }, [shown]);
  const take = () => {
    if (text === shown) return;
    const value = Number(text.replace('−', '-').replace(',', '.'));
    const next: [number, number] = end === 0 ? [value, look.window[1]] : [look.window[0], value];
    if (text.trim() === '' || !Number.isFinite(value)) setWrong('A number, please.');
    else if (next[0] >= next[1]) setWrong('The dark end must lie below the bright one.');
    else look.setWindow(next);
  };
  return (
    <View style={{ flex: 1 }}>
      <Field
        label={KM_S.has(view) ? (end === 0 ? 'Low end' : 'High end') : end === 0 ? 'Dark end' : 'Bright end'}
        mono
        value={text}
        inputMode="decimal"
        onChangeText={setText}
        onBlur={take}
        onSubmitEditing={take}
        problem={wrong}
      />
    </View>
  );
}
