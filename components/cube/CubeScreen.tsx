import { useLocalSearchParams } from 'expo-router';
import { useMemo, useRef, useState } from 'react';
import { View } from 'react-native';
import { CubeState } from '@/components/cube/CubeState';
import { PhoneCube } from '@/components/cube/PhoneCube';
import { SaveState } from '@/components/cube/SaveState';
import { SessionContext } from '@/components/cube/session';
import { useCubeCommands } from '@/components/cube/useCubeCommands';
import { useCubeSession } from '@/components/cube/useCubeSession';
import { useStartPlace } from '@/components/cube/usePlace';
import { useRecordFit } from '@/components/cube/useRecordFit';
import { WideCube } from '@/components/cube/WideCube';
import { MoreOfCube } from '@/components/figure/MoreOfCube';
import { RecordGate } from '@/components/frame/RecordGate';
import { Screen } from '@/components/frame/Screen';
import { IconButton } from '@/components/ui/Button';
import { ProblemNotice } from '@/components/ui/ProblemNotice';
import { Skeleton } from '@/components/ui/Skeleton';
import { space } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';
import { useCube } from '@/hooks/useCubes';
import { useRegion } from '@/hooks/useRegions';
import { useShells } from '@/hooks/useShells';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import { buildWcs, type Wcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';

/** A cube: its channel maps where it is ready, else what is becoming of it. */
export function CubeScreen({ cubeId }: { cubeId: string }) {
  const read = useCube(cubeId);
  const cube = read.data;
  const built = useMemo(
    () => (cube?.status === 'ready' && cube.axes ? build(cube.axes) : null),
    [cube?.status, cube?.axes],
  );
  // with a shell in the address its name, tools and reading belong to the first picture: nothing moves when it comes
  const { shell } = useLocalSearchParams<{ shell?: string }>();
  const shells = useShells(shell && cube ? cube.regionId : null);
  const known = useRef(false);
  known.current ||= !shell || shells.data !== undefined || shells.problem !== null;
  if (cube && built?.wcs && cube.axes && known.current)
    return <Instrument cube={cube} axes={cube.axes} wcs={built.wcs} />;
  return (
    <Framed cube={cube}>
      <RecordGate
        read={read}
        what="cube"
        home={{ href: '/regions', label: 'To the regions' }}
        skeleton={<Waiting />}
      >
        {(found) =>
          built?.problem ? (
            <ProblemNotice problem={built.problem} />
          ) : built ? (
            <Waiting />
          ) : (
            <CubeState cube={found} />
          )
        }
      </RecordGate>
    </Framed>
  );
}

function build(axes: CubeAxes): { wcs: Wcs | null; problem: { title: string; detail: string } | null } {
  try {
    return { wcs: buildWcs(axes.wcs as unknown as WcsSpec), problem: null };
  } catch (error) {
    const detail = error instanceof Error ? error.message : String(error);
    return { wcs: null, problem: { title: 'The coordinates of this cube cannot be used', detail } };
  }
}

function Framed({
  cube,
  title,
  subtitle,
  aside,
  children,
}: {
  cube: Cube | undefined;
  title?: string;
  subtitle?: string;
  aside?: React.ReactNode;
  children: React.ReactNode;
}) {
  const region = useRegion(cube?.regionId ?? null);
  const home = cube ? (`/regions/${cube.regionId}` as const) : '/regions';
  const name = cube?.name ?? 'Cube';
  return (
    <Screen
      full
      title={title ?? name}
      pageTitle={title && title !== name ? `${title} on ${name}` : name}
      subtitle={subtitle}
      back={home}
      aside={aside}
      crumbs={[{ label: region.data?.name ?? 'Region', href: home }, { label: name }]}
    >
      {children}
    </Screen>
  );
}

function Instrument({ cube, axes, wcs }: { cube: Cube; axes: CubeAxes; wcs: Wcs }) {
  const start = useStartPlace();
  const session = useCubeSession(cube, axes, wcs, start);
  const record = useRecordFit(session);
  const { wide } = useWide();
  const [lookOpen, setLookOpen] = useState(false);
  const toggle = () => setLookOpen((open) => !open);
  useCubeCommands(session, {
    onLook: toggle,
    onRun: record.obstacle === null ? () => void record.run() : null,
  });
  const { shell } = session;
  const look = { open: lookOpen, toggle };
  return (
    <SessionContext.Provider value={session}>
      <Framed
        cube={cube}
        title={!wide && shell ? shell.name : cube.name}
        subtitle={shell ? `${cube.name} · ${shell.status}` : undefined}
        aside={
          <View style={{ flexDirection: 'row', alignItems: 'center', marginRight: -space(3) }}>
            <SaveState short={!wide} />
            <MoreOfCube />
            <IconButton icon="info" label="About this cube" href={`/cubes/${cube.id}/about`} />
          </View>
        }
      >
        {wide ? <WideCube record={record} look={look} /> : <PhoneCube record={record} look={look} />}
      </Framed>
    </SessionContext.Provider>
  );
}

/** The places of map and strip while the cube's description is on its way. */
function Waiting() {
  return (
    <View role="status" aria-label="Loading the cube" style={{ flex: 1, padding: space(4), gap: space(3) }}>
      <Skeleton height={32} width="40%" />
      <View style={{ flex: 1 }}>
        <Skeleton height={320} />
      </View>
      <Skeleton height={104} />
    </View>
  );
}
