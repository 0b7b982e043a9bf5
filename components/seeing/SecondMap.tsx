import { useEffect, useMemo, useState } from 'react';
import { View } from 'react-native';
import { useOwnLook } from '@/components/cube/useOwnLook';
import { useSession } from '@/components/cube/session';
import { useScene } from '@/components/cube/useScene';
import { VIEWS } from '@/components/cube/views';
import { ChannelMap } from '@/components/map/ChannelMap';
import { mapStore } from '@/components/map/mapStore';
import { linkViewports } from '@/components/seeing/linkViewports';
import { IconButton } from '@/components/ui/Button';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space } from '@/components/ui/tokens';
import { useMapPlane } from '@/hooks/planes/useMapPlane';
import { usePicture, type Recipe } from '@/hooks/planes/usePicture';
import { velocityLabel } from '@/shared/image/velocityDigits';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

const nothing = () => undefined;

/** A second map beside the first, which it follows in place and zoom, and leads as well. */
export function SecondMap() {
  const s = useSession();
  const { cube, axes, wcs, seeing, seen, channelPlanes, channelLook, coordinates, model } = s;
  const { color } = useTheme();
  const [store] = useState(mapStore);
  const { other, second } = seeing;
  const otherChannel = second === 'other' && typeof other === 'number' ? other : null;
  const kind = second === 'other' ? null : second;
  const map = useMapPlane(cube, kind);
  const held = otherChannel === null ? null : channelPlanes.store.best(otherChannel);
  const shown = useMemo(
    () =>
      otherChannel === null
        ? map
        : { plane: held ?? channelPlanes.thumbnail(otherChannel), problem: null, retry: channelPlanes.retry },
    [otherChannel, map, held, channelPlanes],
  );
  const recipe = useMemo<Recipe>(
    () => ({
      sources: otherChannel === null ? [] : [otherChannel],
      minus: [],
      smooth: null,
      less: null,
      view: seen.view,
      stretch: null,
    }),
    [otherChannel, seen],
  );
  const picture = usePicture(
    shown,
    channelPlanes,
    recipe,
    axes.wcs as unknown as WcsSpec,
    `${cube.id} ${second}`,
  );
  const look = useOwnLook(kind, picture.plane, channelLook) ?? channelLook;
  const scene = useScene({
    seen,
    frame: axes.frame,
    velocityOf: wcs.velocityOf,
    order: s.order,
    channel: otherChannel ?? s.channel,
    channelWidth: axes.spectral.channelWidth,
    allChannels: otherChannel === null,
    marks: s.marks,
    selected: [],
    readings: s.live.readings,
    model,
    beam: axes.beam,
    grid: coordinates.grid,
    notation: coordinates.notation,
    distancePc: s.shell?.adopted?.distance?.pc ?? null,
    contours: s.contours.lines,
  });
  useEffect(() => linkViewports(s.store.viewport, store.viewport), [s.store, store]);
  const title =
    otherChannel === null
      ? VIEWS[kind ?? 'total'].long
      : `Channel ${otherChannel + 1}, ${velocityLabel(wcs.velocityOf(otherChannel), axes.spectral.channelWidth)} km/s`;
  return (
    <View
      testID="second-map"
      style={{
        flex: 1,
        minWidth: 0,
        backgroundColor: color.image,
        borderRadius: radius.small,
        overflow: 'hidden',
      }}
    >
      <ChannelMap
        store={store}
        nx={seen.nx}
        ny={seen.ny}
        plane={picture.plane}
        stale={!picture.plane}
        look={look.look}
        scene={scene}
        label={`Second map: ${title}.`}
        tool="move"
        start={null}
        onPlace={nothing}
        onSelect={nothing}
        onMove={nothing}
      />
      <View
        style={{
          position: 'absolute',
          left: space(2),
          top: space(2),
          flexDirection: 'row',
          alignItems: 'center',
          paddingLeft: space(3),
          borderRadius: radius.small,
          backgroundColor: color.image,
        }}
      >
        <Text size="small" tone="onImage" weight="semibold">
          {title}
        </Text>
        <IconButton
          icon="close"
          label="Close the second map"
          tone="onImage"
          onPress={() => seeing.change({ second: null })}
        />
      </View>
      {picture.problem && (
        <View style={{ position: 'absolute', left: space(3), right: space(3), bottom: space(3) }}>
          <ProblemNotice problem={picture.problem} onRetry={picture.retry} />
        </View>
      )}
    </View>
  );
}
