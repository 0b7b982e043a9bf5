import { useEffect, useMemo, useState } from 'react';
import { ScrollView, View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { VIEW_ORDER, VIEWS, type View as Shown } from '@/components/cube/views';
import { WindowSlider } from '@/components/cube/WindowSlider';
import { trackRange } from '@/components/cube/windowScale';
import { brightness, frameWords } from '@/components/cube/words';
import { Button, IconButton } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { SectionTitle } from '@/components/ui/Panel';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { hairline, radius, space } from '@/components/ui/tokens';
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

/** Which picture; palette, tone, brightness window and coordinate lines; lies over the map's edge, so that every change is seen. */
export function LookPanel({ onClose }: { onClose: () => void }) {
  const { look, planes, axes, cube, grid, setGrid, view, setView, unit } = useSession();
  const { color } = useTheme();
  const gradient = useMemo(() => cssGradient(look.palette), [look.palette]);
  const [lowest, highest] = useMemo(() => {
    if (view === 'channel') return [cube.statistics?.minimum ?? null, cube.statistics?.maximum ?? null];
    return (planes.plane && windowOf(planes.plane, 1)) ?? [null, null];
  }, [view, cube.statistics, planes.plane]);
  const range = trackRange(look.window, lowest, highest);
  const own = frameWords(axes.frame);
  const preset = (share: number) => {
    const found = planes.plane && windowOf(planes.plane, share);
    if (found) look.setWindow(found);
  };
  const keys = {
    onKeyDown: (e: { key: string; stopPropagation(): void }) => {
      if (e.key !== 'Escape') return;
      e.stopPropagation();
      onClose();
    },
  } as object;
  return (
    <View
      role="region"
      aria-label="Look of the map"
      {...keys}
      style={{
        width: '100%',
        maxWidth: space(90),
        maxHeight: '100%',
        paddingTop: space(1),
        borderRadius: radius.large,
        borderWidth: hairline,
        borderColor: color.line,
        backgroundColor: color.panel,
        boxShadow: `0 ${space(1)}px ${space(6)}px ${color.shadow}`,
      }}
    >
      <View
        style={{
          flexDirection: 'row',
          alignItems: 'center',
          justifyContent: 'space-between',
          paddingHorizontal: space(4),
        }}
      >
        <SectionTitle level={3}>Look</SectionTitle>
        <IconButton
          icon="close"
          label="Close the look of the map"
          onPress={onClose}
          style={{ marginRight: -space(3) }}
        />
      </View>
      <ScrollView
        style={{ flexGrow: 0 }}
        contentContainerStyle={{ gap: space(3), padding: space(4), paddingTop: space(1) }}
      >
        <SegmentedChoice
          small
          label="Picture"
          value={view}
          options={VIEW_ORDER.map((v) => ({ value: v, label: VIEWS[v].label }))}
          onChange={setView}
        />
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
        <SegmentedChoice
          label="Lines of coordinates"
          value={grid}
          options={[
            { value: 'galactic', label: 'l, b' },
            ...(axes.frame === 'galactic'
              ? []
              : [{ value: 'own' as const, label: `${own.lon}, ${own.lat}` }]),
            { value: 'off', label: 'none' },
          ]}
          onChange={setGrid}
        />
      </ScrollView>
    </View>
  );
}

/** One end as a number to type; taken over when it makes sense, said when not. */
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
