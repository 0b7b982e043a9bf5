import type { Href } from 'expo-router';
import { View } from 'react-native';
import { ChannelSheet } from '@/components/about/ChannelSheet';
import { FactPanels } from '@/components/about/FactPanels';
import { HeaderPanel } from '@/components/about/HeaderPanel';
import { OverlapPanel } from '@/components/about/OverlapPanel';
import { OverridesPanel } from '@/components/about/OverridesPanel';
import { SourcePanel } from '@/components/about/SourcePanel';
import { CubeProgress } from '@/components/cube/CubeState';
import { RecordGate } from '@/components/frame/RecordGate';
import { Screen } from '@/components/frame/Screen';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/ProblemNotice';
import { Text } from '@/components/ui/Text';
import { space } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';
import { useCube } from '@/hooks/useCubes';
import { useRegion } from '@/hooks/useRegions';
import type { Cube } from '@/shared/contract/cubes';

/** All that is known of a cube: what its header says, what was assumed, what the team says beside it. */
export function AboutPage({ cubeId }: { cubeId: string }) {
  const read = useCube(cubeId);
  const cube = read.data;
  const region = useRegion(cube?.regionId ?? null);
  const regionHome: Href = cube ? `/regions/${cube.regionId}` : '/regions';
  const cubeHome: Href = `/cubes/${cubeId}`;
  const name = cube?.name ?? 'Cube';
  return (
    <Screen
      title={`About ${name}`}
      back={cube?.status === 'ready' ? cubeHome : regionHome}
      crumbs={[
        { label: region.data?.name ?? 'Region', href: regionHome },
        { label: name, href: cubeHome },
        { label: 'About' },
      ]}
      actions={
        !cube
          ? null
          : cube.status === 'ready' && (
              <Button label="Channel maps" icon="cube" href={cubeHome} kind="primary" />
            )
      }
    >
      <RecordGate read={read} what="cube" home={{ href: '/regions', label: 'To the regions' }}>
        {(found) => <About cube={found} />}
      </RecordGate>
    </Screen>
  );
}

function About({ cube }: { cube: Cube }) {
  const { wide } = useWide();
  const column = wide ? ({ flex: 1, minWidth: 0, gap: space(4) } as const) : { gap: space(4) };
  return (
    <>
      {cube.status !== 'ready' && <CubeProgress cube={cube} />}
      {cube.cautions.length > 0 && (
        <View role="list" aria-label="Cautions" style={{ gap: space(2) }}>
          {cube.cautions.map((caution) => (
            <View key={caution} role="listitem">
              <Notice kind="person">
                <Text>{caution}</Text>
              </Notice>
            </View>
          ))}
        </View>
      )}
      <View style={{ flexDirection: wide ? 'row' : 'column', gap: space(4) }}>
        <View style={column}>
          <FactPanels cube={cube} part="axes" />
        </View>
        <View style={column}>
          <FactPanels cube={cube} part="rest" />
          <OverridesPanel cube={cube} />
          <SourcePanel key={`${cube.source.hdu} ${cube.source.stokes}`} cube={cube} />
          <OverlapPanel cube={cube} />
        </View>
      </View>
      {cube.status === 'ready' && cube.axes && <ChannelSheet cube={cube} axes={cube.axes} />}
      {cube.axes && <HeaderPanel cubeId={cube.id} />}
    </>
  );
}
