import { useRouter } from 'expo-router';
import { Fragment, useState } from 'react';
import { View } from 'react-native';
import type { Region } from '@/shared/contract/regions';
import { useCubes } from '@/hooks/useCubes';
import { useMay } from '@/hooks/useMe';
import { useRegion } from '@/hooks/useRegions';
import { useShells } from '@/hooks/useShells';
import { useUploads } from '@/hooks/useUploads';
import { RecordGate } from '../frame/RecordGate';
import { Screen } from '../frame/Screen';
import { ShellDialog } from '../shells/ShellDialog';
import { ShellRow } from '../shells/ShellRow';
import { Button } from '../ui/Button';
import { Chip } from '../ui/Chip';
import { useCommands } from '../ui/commands/CommandsProvider';
import { EmptyState } from '../ui/EmptyState';
import { Panel, Rule } from '../ui/Panel';
import { SkeletonRows } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { chooseFiles } from '../upload/chooseFiles';
import { DropCurtain } from '../upload/DropCurtain';
import { UploadsPanel } from '../upload/UploadsPanel';
import { useFileDrop } from '../upload/useFileDrop';
import { CubeRow } from './CubeRow';
import { centreText, distanceText, waitingChips } from './RegionCard';
import { RegionDialog } from './RegionDialog';

/** A region: its cubes and what is on the way to become one, its shells, what waits. */
export function RegionPage({ regionId }: { regionId: string }) {
  const region = useRegion(regionId);
  const { wide } = useWide();
  const mayAct = useMay();
  const { add } = useUploads();
  const [dialog, setDialog] = useState<'edit' | 'shell' | null>(null);
  const router = useRouter();
  const mayUpload = mayAct('cube.upload') && region.data !== undefined;
  const dragging = useFileDrop((files) => add(regionId, files), mayUpload);
  const choose = async () => {
    const files = await chooseFiles();
    if (files.length > 0) add(regionId, files);
  };
  useCommands([
    {
      name: 'cube.upload',
      label: 'Upload cubes',
      keys: ['u'],
      group: 'Region',
      enabled: mayUpload,
      perform: () => void choose(),
    },
    {
      name: 'shell.new',
      label: 'New shell',
      keys: ['n'],
      group: 'Region',
      enabled: mayAct('shell.create'),
      perform: () => setDialog('shell'),
    },
  ]);
  const name = region.data?.name ?? 'Region';
  const upload = mayUpload && (
    <Button kind="primary" icon="upload" label="Upload cubes" onPress={() => void choose()} />
  );
  return (
    <Screen
      title={name}
      crumbs={[{ label: 'Regions', href: '/regions' }, { label: name }]}
      back="/regions"
      actions={
        (mayAct('region.edit') || mayUpload) &&
        (region.data ? (
          <>
            {mayAct('region.edit') && <Button icon="edit" label="Edit" onPress={() => setDialog('edit')} />}
            {upload}
          </>
        ) : null)
      }
    >
      <RecordGate read={region} what="region" home={{ href: '/regions', label: 'To the regions' }}>
        {(data) => (
          <>
            <About region={data} />
            <UploadsPanel regionId={regionId} />
            <View
              style={{
                flexDirection: wide ? 'row' : 'column',
                gap: space(4),
                alignItems: wide ? 'flex-start' : 'stretch',
              }}
            >
              <View style={wide ? { flex: 3, minWidth: 0 } : undefined}>
                <CubeList regionId={regionId} upload={upload} />
              </View>
              <View style={wide ? { flex: 2, minWidth: 0 } : undefined}>
                <ShellList
                  regionId={regionId}
                  onNew={mayAct('shell.create') ? () => setDialog('shell') : null}
                />
              </View>
            </View>
            {dialog === 'edit' && <RegionDialog region={data} onClose={() => setDialog(null)} />}
          </>
        )}
      </RecordGate>
      {dialog === 'shell' && (
        <ShellDialog
          regionId={regionId}
          onClose={() => setDialog(null)}
          onDone={(shell) => router.push(`/shells/${shell.id}`)}
        />
      )}
      {dragging && <DropCurtain regionName={name} />}
    </Screen>
  );
}

function About({ region }: { region: Region }) {
  const chips = waitingChips(region);
  const facts = [centreText(region), distanceText(region)].filter(Boolean) as string[];
  if (!region.description && facts.length + chips.length === 0) return null;
  return (
    <View style={{ gap: space(2) }}>
      {region.description ? <Text tone="quiet">{region.description}</Text> : null}
      <View
        style={{
          flexDirection: 'row',
          flexWrap: 'wrap',
          columnGap: space(4),
          rowGap: space(2),
          alignItems: 'center',
        }}
      >
        {facts.map((fact) => (
          <Text key={fact} mono size="small">
            {fact}
          </Text>
        ))}
        {chips.map((c) => (
          <Chip key={c.label} {...c} />
        ))}
      </View>
    </View>
  );
}

function CubeList({ regionId, upload }: { regionId: string; upload: React.ReactNode }) {
  const cubes = useCubes(regionId);
  const { wide } = useWide();
  const total = cubes.data?.items.length;
  return (
    <Panel
      flush
      title="Cubes"
      aside={
        total ? (
          <Text mono tone="quiet">
            {total}
          </Text>
        ) : undefined
      }
    >
      <RecordGate read={cubes} what="cubes" skeleton={<Waiting />}>
        {({ items }) =>
          items.length === 0 ? (
            <EmptyState icon="cube" title="No cube yet" action={upload}>
              {upload
                ? `${wide ? 'Drop FITS files anywhere on this page, or choose them.' : 'Choose one FITS file or several.'} The header is checked as soon as its first bytes are there.`
                : 'A lead or an analyst of your team uploads the first one.'}
            </EmptyState>
          ) : (
            <View role="list" aria-label="Cubes" style={{ paddingBottom: space(1) }}>
              {items.map((cube, i) => (
                <Fragment key={cube.id}>
                  {i > 0 && <Rule />}
                  <CubeRow cube={cube} />
                </Fragment>
              ))}
            </View>
          )
        }
      </RecordGate>
    </Panel>
  );
}

function ShellList({ regionId, onNew }: { regionId: string; onNew: (() => void) | null }) {
  const shells = useShells(regionId);
  const button = onNew && <Button icon="plus" label="New shell" onPress={onNew} />;
  return (
    <Panel
      flush
      title="Shells"
      aside={
        shells.data &&
        shells.data.items.length > 0 && (
          <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(3) }}>
            <Text mono tone="quiet">
              {shells.data.items.length}
            </Text>
            {button}
          </View>
        )
      }
    >
      <RecordGate read={shells} what="shells" skeleton={<Waiting />}>
        {({ items }) =>
          items.length === 0 ? (
            <EmptyState icon="shells" title="No shell yet" action={button}>
              A shell is a claim: name one, open it in a cube and mark its rim on a few channels.
            </EmptyState>
          ) : (
            <View role="list" aria-label="Shells" style={{ paddingBottom: space(1) }}>
              {items.map((shell, i) => (
                <Fragment key={shell.id}>
                  {i > 0 && <Rule />}
                  <ShellRow shell={shell} />
                </Fragment>
              ))}
            </View>
          )
        }
      </RecordGate>
    </Panel>
  );
}

const Waiting = () => (
  <View style={{ padding: space(4), paddingTop: 0 }}>
    <SkeletonRows rows={3} height={52} />
  </View>
);
