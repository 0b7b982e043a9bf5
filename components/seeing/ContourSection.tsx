import { brightness } from '@/components/cube/words';
import { useSession } from '@/components/cube/session';
import { VIEWS } from '@/components/cube/views';
import { CompanionImages } from '@/components/seeing/CompanionImages';
import { LevelFields } from '@/components/seeing/LevelFields';
import { NumberSlider } from '@/components/seeing/NumberSlider';
import { MAPS, MOST_LEVELS, type ContourChoice } from '@/components/seeing/seeing';
import { SegmentedChoice } from '@/components/ui/SegmentedChoice';
import { Select } from '@/components/ui/Select';
import { Text } from '@/components/ui/Text';
import { useCubes } from '@/hooks/useCubes';
import { useImages } from '@/hooks/useImages';

/** Contours of another map, or of an image of the same sky: of which, and at which levels. */
export function ContourSection() {
  const { cube, seeing, contours } = useSession();
  const cubes = useCubes(cube.regionId);
  const images = useImages(cube.regionId).data?.items ?? [];
  const ready = cubes.data?.items.filter((c) => c.status === 'ready') ?? [];
  const chosen = seeing.contours;
  const image = (chosen?.kind === 'image' && images.find(({ id }) => id === chosen.of)) || null;
  const set = (more: Partial<ContourChoice>) =>
    chosen && seeing.change({ contours: { ...chosen, ends: null, ...more } });
  const choose = (of: string, isImage: boolean) => {
    const map = chosen && chosen.kind !== 'image' ? chosen.kind : 'total';
    seeing.change({
      contours: { count: 5, ...chosen, of, kind: isImage ? 'image' : map, ends: null },
    });
  };
  return (
    <>
      <Select
        label="Contours of"
        value={chosen?.of ?? 'none'}
        options={[
          { value: 'none', label: 'nothing' },
          ...ready.map((c) => ({ value: c.id, label: c.name })),
          ...images.map(({ id, name }) => ({ value: id, label: `${name} (image)` })),
        ]}
        onChange={(of) =>
          of === 'none'
            ? seeing.change({ contours: null })
            : choose(
                of,
                images.some(({ id }) => id === of),
              )
        }
      />
      {chosen && (
        <>
          {chosen.kind !== 'image' && (
            <SegmentedChoice
              small
              label="Map"
              value={chosen.kind}
              options={MAPS.map((kind) => ({ value: kind, label: VIEWS[kind].label }))}
              onChange={(kind) => set({ kind })}
            />
          )}
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
                ? `At ${[contours.levels.map(brightness).join(', '), contours.unit].filter(Boolean).join(' ')}`
                : 'The map is being read.')}
          </Text>
        </>
      )}
      <CompanionImages
        regionId={cube.regionId}
        chosen={image}
        onAdded={({ id }) => choose(id, true)}
        onRemoved={() => seeing.change({ contours: null })}
      />
    </>
  );
}
