import { useEffect, useState } from 'react';
import { View } from 'react-native';
import { useSession } from '@/components/cube/session';
import { brightness, frameWords } from '@/components/cube/words';
import { VIEWS } from '@/components/cube/views';
import { NumberSlider } from '@/components/seeing/NumberSlider';
import { MAPS, MOST_LEVELS, type ContourChoice } from '@/components/seeing/seeing';
import { Field } from '@/components/ui/Field';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Select } from '@/components/ui/Select';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { useCubes } from '@/hooks/useCubes';

/** Lines of coordinates and how angles are written; contours of another map. */
export function LinesSection() {
  const { coordinates, axes, cube, seeing, contours } = useSession();
  const { grid, notation, setGrid, setNotation } = coordinates;
  const own = frameWords(axes.frame === 'galactic' ? 'icrs' : axes.frame);
  const cubes = useCubes(cube.regionId);
  const ready = cubes.data?.items.filter((c) => c.status === 'ready') ?? [];
  const chosen = seeing.contours;
  const set = (more: Partial<ContourChoice>) =>
    chosen && seeing.change({ contours: { ...chosen, ends: null, ...more } });
  return (
    <>
      <SegmentedChoice
        label="Lines of coordinates"
        value={grid}
        options={[
          { value: 'galactic', label: 'l, b' },
          { value: 'equatorial', label: `${own.lon}, ${own.lat}` },
          { value: 'off', label: 'none' },
        ]}
        onChange={setGrid}
      />
      <SegmentedChoice
        label="Angles"
        value={notation}
        options={[
          { value: 'decimal', label: 'Degrees' },
          { value: 'sexagesimal', label: 'Sexagesimal' },
        ]}
        onChange={setNotation}
      />
      <Select
        label="Contours of"
        value={chosen?.cube ?? 'none'}
        options={[{ value: 'none', label: 'nothing' }, ...ready.map((c) => ({ value: c.id, label: c.name }))]}
        onChange={(id) =>
          seeing.change({
            contours: id === 'none' ? null : { kind: 'total', count: 5, ...chosen, cube: id, ends: null },
          })
        }
      />
      {chosen && (
        <>
          <SegmentedChoice
            small
            label="Map"
            value={chosen.kind}
            options={MAPS.map((kind) => ({ value: kind, label: VIEWS[kind].label }))}
            onChange={(kind) => set({ kind })}
          />
          <NumberSlider
            label="Levels"
            value={chosen.count}
            low={1}
            high={MOST_LEVELS}
            step={1}
            words={String(chosen.count)}
            onChange={(count) => set({ count, ends: chosen.ends })}
          />
          {contours.ends && <LevelFields ends={contours.ends} onChange={(ends) => set({ ends })} />}
          <Text size="small" tone={contours.problem ? 'error' : 'quiet'}>
            {contours.problem ??
              (contours.levels.length > 0
                ? `At ${contours.levels.map(brightness).join(', ')}`
                : 'The map is being read.')}
          </Text>
        </>
      )}
    </>
  );
}

function LevelFields({
  ends,
  onChange,
}: {
  ends: readonly [number, number];
  onChange: (ends: [number, number]) => void;
}) {
  return (
    <View style={{ flexDirection: 'row', gap: space(3) }}>
      {(['Lowest level', 'Highest level'] as const).map((label, end) => (
        <LevelField
          key={label}
          label={label}
          value={ends[end]!}
          fits={(v) => (end === 0 ? v < ends[1] : v > ends[0])}
          onChange={(v) => onChange(end === 0 ? [v, ends[1]] : [ends[0], v])}
        />
      ))}
    </View>
  );
}

function LevelField({
  label,
  value,
  fits,
  onChange,
}: {
  label: string;
  value: number;
  fits: (value: number) => boolean;
  onChange: (value: number) => void;
}) {
  const shown = brightness(value);
  const [text, setText] = useState(shown);
  const [wrong, setWrong] = useState(false);
  useEffect(() => {
    setText(shown);
    setWrong(false);
  }, [shown]);
  const take = () => {
    if (text === shown) return;
    const number = Number(text.replace('−', '-').replace(',', '.'));
    const holds = text.trim() !== '' && Number.isFinite(number) && fits(number);
    setWrong(!holds);
    if (holds) onChange(number);
  };
  return (
    <View style={{ flex: 1 }}>
      <Field
        label={label}
        mono
        inputMode="decimal"
        value={text}
        onChangeText={setText}
        onBlur={take}
        onSubmitEditing={take}
        problem={wrong ? 'A number, the lowest below the highest.' : null}
      />
    </View>
  );
}
