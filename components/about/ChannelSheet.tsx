import { useMemo } from 'react';
import { View } from 'react-native';
import { ChannelTile } from '@/components/about/ChannelTile';
import { stripOrder } from '@/components/strip/stripOrder';
import { useStripPicture } from '@/components/strip/useStripPicture';
import { Panel } from '@/components/ui/Panel';
import { Press, type PressState } from '@/components/ui/Press';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/theme';
import { radius, space } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';
import { useChannels } from '@/hooks/useCubes';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import { rampOf } from '@/shared/image/palettes';
import { velocityLabel } from '@/shared/image/velocityDigits';

/** All channels at a glance, by rising velocity; each is a way to its channel map. */
export function ChannelSheet({ cube, axes }: { cube: Cube; axes: CubeAxes }) {
  const { data, problem, reload } = useChannels(cube.id);
  const { wide } = useWide();
  const ink = useMemo(() => rampOf('Ink'), []);
  const strip = useStripPicture(cube, ink, 'arcsinh');
  const step = strip.picture?.step ?? 1;
  const order = useMemo(() => data && stripOrder(data.items.map((c) => c.velocity)), [data]);
  const shown = order?.channels.filter((channel) => channel % step === 0) ?? [];
  const failed = problem ?? strip.problem;
  const side = wide ? space(22) : space(18);
  return (
    <Panel
      title="Channels"
      aside={
        <Text size="small" tone="quiet">
          {step > 1 ? `each ${step}th of ${axes.channels}, km/s` : 'km/s'}
        </Text>
      }
    >
      {failed && <ProblemNotice problem={failed} onRetry={() => void reload()} />}
      <View
        role="list"
        aria-label="Channels by velocity"
        style={
          {
            display: 'grid',
            gridTemplateColumns: `repeat(auto-fill, minmax(${side}px, 1fr))`,
            gap: space(2),
            minHeight: side,
          } as object
        }
      >
        {shown.map((channel) => (
          <Tile
            key={channel}
            href={`/cubes/${cube.id}?ch=${channel}`}
            name={`Channel ${channel + 1}`}
            velocity={velocityLabel(data!.items[channel]!.velocity, axes.spectral.channelWidth)}
          >
            <ChannelTile
              picture={strip.picture}
              index={channel / step}
              count={Math.ceil(axes.channels / step)}
            />
          </Tile>
        ))}
      </View>
    </Panel>
  );
}

function Tile(props: {
  href: `/cubes/${string}`;
  name: string;
  velocity: string;
  children: React.ReactNode;
}) {
  const { href, name, velocity, children } = props;
  const { color } = useTheme();
  return (
    <View role="listitem">
      <Press
        href={href}
        aria-label={`${name}, ${velocity} km/s`}
        style={({ hovered }: PressState) => ({
          gap: space(0.5),
          padding: space(0.5),
          borderRadius: radius.small,
          backgroundColor: hovered ? color.selected : 'transparent',
        })}
      >
        <View
          style={{
            width: '100%',
            aspectRatio: 1,
            overflow: 'hidden',
            borderRadius: radius.small,
            backgroundColor: color.image,
          }}
        >
          {children}
        </View>
        <Text mono size="small" align="center" numberOfLines={1}>
          {velocity}
        </Text>
      </Press>
    </View>
  );
}
