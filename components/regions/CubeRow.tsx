import { useState } from 'react';
import { useRouter } from 'expo-router';
import { Image, View } from 'react-native';
import type { Cube } from '@/shared/contract/cubes';
import { asProblem } from '@/hooks/api';
import { cubeImage } from '@/hooks/cubeImages';
import { useCubeActions } from '@/hooks/useCubes';
import { useMay } from '@/hooks/useMe';
import { velocityLabel } from '@/shared/image/velocityDigits';
import { Button } from '../ui/Button';
import { StatusChip } from '../ui/Chip';
import { ago, fileSize } from '../ui/format';
import { Icon } from '../ui/Icon';
import { Menu } from '../ui/Menu';
import { Press, type PressState } from '../ui/Press';
import { ProblemNotice } from '../ui/ProblemNotice';
import { ProgressBar } from '../ui/ProgressBar';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { useToast } from '../ui/Toast';
import { radius, space, touch } from '../ui/tokens';
import { RenameDialog } from '../ui/RenameDialog';

/** '512 × 512 × 128 · −62.1 … 14.0 km/s · galactic', or the file's size before its axes are known. */
export function cubeFacts(cube: Cube): string {
  const a = cube.axes;
  if (!a) return fileSize(cube.sizeBytes);
  const width = a.spectral.channelWidth;
  const [first, last] = a.spectral.velocities;
  const [low, high] = first < last ? [first, last] : [last, first];
  return [
    `${a.nx} × ${a.ny} × ${a.channels}`,
    `${velocityLabel(low, width)} … ${velocityLabel(high, width)} km/s`,
    a.frame,
  ].join(' · ');
}

/** A cube of a region: what it is, how far it is read, and what can be done with it. */
export function CubeRow({ cube }: { cube: Cube }) {
  const { color } = useTheme();
  const mayManage = useMay()('cube.manage');
  const { retry, cancel, remove, restore, rename } = useCubeActions();
  const say = useToast();
  const router = useRouter();
  const [busy, setBusy] = useState(false);
  const [renaming, setRenaming] = useState(false);

  async function act(what: string, action: () => Promise<unknown>) {
    setBusy(true);
    try {
      await action();
    } catch (error) {
      say({
        kind: 'error',
        text: `${what} did not work: ${asProblem(error).detail || asProblem(error).title}`,
      });
    } finally {
      setBusy(false);
    }
  }
  const takeOut = () =>
    act('Taking the cube out', async () => {
      await remove(cube);
      say({
        text: `${cube.name} was taken out of the region.`,
        action: { label: 'Undo', perform: () => void act('Putting the cube back', () => restore(cube.id)) },
      });
    });

  const ready = cube.status === 'ready';
  const going = cube.status === 'ingesting' || cube.status === 'uploaded';
  const head = (
    <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(3), flex: 1, minWidth: 0 }}>
      <CubePicture cube={cube} />
      <View style={{ flex: 1, minWidth: 0, gap: space(0.5) }}>
        <Text weight="semibold" numberOfLines={2} style={{ overflowWrap: 'anywhere' } as object}>
          {cube.name}
        </Text>
        <Text size="small" mono tone="quiet" numberOfLines={3}>
          {cubeFacts(cube)}
        </Text>
        <Text size="small" tone="quiet" numberOfLines={1}>
          {[cube.createdBy?.name, ago(cube.createdAt)].filter(Boolean).join(', ')}
        </Text>
      </View>
    </View>
  );
  return (
    <View
      role="listitem"
      style={{ paddingLeft: space(4), paddingRight: space(1), paddingVertical: space(2), gap: space(2) }}
    >
      <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2) }}>
        {ready ? (
          <Press
            href={`/cubes/${cube.id}`}
            style={({ hovered }: PressState) => ({
              flex: 1,
              flexDirection: 'row',
              minHeight: touch,
              borderRadius: radius.small,
              opacity: hovered ? 0.85 : 1,
            })}
          >
            {head}
          </Press>
        ) : (
          head
        )}
        <StatusChip status={cube.status} />
        <Menu
          label={`What can be done with ${cube.name}`}
          items={[
            { label: 'About this cube', icon: 'info', perform: () => router.push(`/cubes/${cube.id}/about`) },
            ...(mayManage
              ? [{ label: 'Rename', icon: 'edit' as const, perform: () => setRenaming(true) }]
              : []),
            ...(mayManage && going
              ? [
                  {
                    label: 'Stop reading',
                    icon: 'close' as const,
                    perform: () => void act('Stopping', () => cancel(cube.id)),
                  },
                ]
              : []),
            ...(mayManage
              ? [
                  {
                    label: 'Take out of the region',
                    icon: 'trash' as const,
                    danger: true,
                    perform: () => void takeOut(),
                  },
                ]
              : []),
          ]}
        />
      </View>
      {going && (
        <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2), paddingRight: space(3) }}>
          <View style={{ flex: 1 }}>
            <ProgressBar
              label={`Reading ${cube.name}`}
              value={cube.progress}
              activity={cube.activity ?? 'Waiting for the worker'}
            />
          </View>
          {mayManage && (
            <Button label="Stop" busy={busy} onPress={() => void act('Stopping', () => cancel(cube.id))} />
          )}
        </View>
      )}
      {(cube.status === 'failed' || cube.status === 'cancelled') && (
        <View style={{ paddingRight: space(3) }}>
          <ProblemNotice
            problem={
              cube.problem ?? {
                title: 'Reading was stopped',
                detail: 'Read it again, or take it out of the region.',
              }
            }
            onRetry={mayManage ? () => void act('Reading again', () => retry(cube.id)) : undefined}
            retryLabel="Read again"
            busy={busy}
          />
        </View>
      )}
      {cube.cautions.length > 0 && ready && (
        <View style={{ flexDirection: 'row', gap: space(2), alignItems: 'center', paddingRight: space(3) }}>
          <Icon name="info" size={16} tone="quiet" />
          <Text size="small" tone="quiet" style={{ flex: 1, color: color.quiet }}>
            {cube.cautions.join(' ')}
          </Text>
        </View>
      )}
      {renaming && (
        <RenameDialog
          what="cube"
          name={cube.name}
          maxLength={120}
          onClose={() => setRenaming(false)}
          onSave={(name) => rename(cube.id, name)}
        />
      )}
    </View>
  );
}

/** The middle channel in miniature. */
function CubePicture({ cube }: { cube: Cube }) {
  const { color } = useTheme();
  const side = space(12);
  const middle = cube.axes ? Math.floor(cube.axes.channels / 2) : 0;
  return (
    <View
      aria-hidden
      style={{
        width: side,
        height: side,
        borderRadius: radius.small,
        overflow: 'hidden',
        backgroundColor: color.image,
        alignItems: 'center',
        justifyContent: 'center',
      }}
    >
      {cube.status === 'ready' ? (
        <Image
          source={{ uri: cubeImage(cube, `channels/${middle}/thumbnail`) }}
          alt=""
          resizeMode="cover"
          style={{ width: side, height: side }}
        />
      ) : (
        <Icon name="cube" tone="onImage" />
      )}
    </View>
  );
}
