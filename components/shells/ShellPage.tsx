import { useState } from 'react';
import { View } from 'react-native';
import type { Shell } from '@/shared/contract/shells';
import { useFits } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import { useShell } from '@/hooks/useShells';
import { isDone } from '../fit/fitFacts';
import { FitList } from '../fit/FitList';
import { FitSummary } from '../fit/FitSummary';
import { RecordGate } from '../frame/RecordGate';
import { Screen } from '../frame/Screen';
import { Button } from '../ui/Button';
import { Chip, StatusChip } from '../ui/Chip';
import { EmptyState } from '../ui/EmptyState';
import { ago, count } from '../ui/format';
import { Menu } from '../ui/Menu';
import { Panel } from '../ui/Panel';
import { Notice } from '../ui/ProblemNotice';
import { SkeletonRows } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { DistancePanel } from './DistancePanel';
import { MeasuresPanel } from './MeasuresPanel';
import { OpenInCube } from './OpenInCube';
import { ShellDialog } from './ShellDialog';
import { useShellMenu } from './useShellMenu';

/** A shell: what is adopted, every fit of record with a way to its report, distances, readings. */
export function ShellPage({ shellId }: { shellId: string }) {
  const shell = useShell(shellId);
  const data = shell.data;
  const name = data?.name ?? 'Shell';
  return (
    <Screen
      title={name}
      subtitle={data?.designation ?? undefined}
      crumbs={[
        ...(data
          ? [{ label: data.regionName, href: `/regions/${data.regionId}` as const }]
          : [{ label: 'Shells', href: '/shells' as const }]),
        { label: name },
      ]}
      back={data ? `/regions/${data.regionId}` : '/shells'}
      actions={data ? <Actions shell={data} /> : null}
    >
      <RecordGate read={shell} what="shell" home={{ href: '/shells', label: 'To the shells' }}>
        {(s) => <Content shell={s} />}
      </RecordGate>
    </Screen>
  );
}

function Actions({ shell }: { shell: Shell }) {
  const may = useMay();
  const [editing, setEditing] = useState(false);
  const items = useShellMenu(shell);
  return (
    <>
      <StatusChip status={shell.status} />
      {may('shell.edit') && <Button icon="edit" label="Edit" onPress={() => setEditing(true)} />}
      <OpenInCube shell={shell} />
      {items.length > 0 && <Menu label={`More for ${shell.name}`} items={items} />}
      {editing && <ShellDialog regionId={shell.regionId} shell={shell} onClose={() => setEditing(false)} />}
    </>
  );
}

function Content({ shell }: { shell: Shell }) {
  const { wide } = useWide();
  const fits = useFits(shell.id);
  const done = (fits.data?.items ?? []).filter(isDone);
  const shown = done.find((f) => f.id === shell.adoptedFitId) ?? done[0] ?? null;
  const settled = fits.data !== undefined || fits.problem !== null;
  // the list of fits pushes down what is below it, and the measures are longer where no fit stands beside them
  const side = !settled ? (
    <SkeletonRows rows={4} height={140} label="Loading fits and distances" />
  ) : (
    <View style={{ gap: space(4), alignSelf: 'stretch' }}>
      <MeasuresPanel shell={shell} brief={shown !== null && shown.id === shell.adoptedFitId} />
      <FitList shell={shell} />
      <DistancePanel shell={shell} />
      <Readings shell={shell} />
    </View>
  );
  const summary =
    fits.data === undefined ? (
      // what is below it must not be in sight before it is there
      !fits.problem && <SkeletonRows rows={3} height={wide ? 120 : 280} />
    ) : shown ? (
      <View style={{ gap: space(4) }}>
        {shown.id !== shell.adoptedFitId && (
          <Notice title="No fit is adopted yet: this is the newest">
            {shown.adoptable
              ? 'Adopt it under “Fits of record” if it should stand for the shell in the catalogue.'
              : 'Its marks do not measure the radius, so it cannot stand for the shell.'}
          </Notice>
        )}
        <FitSummary key={shown.id} fit={shown} name={shell.name} />
        <View style={{ flexDirection: 'row' }}>
          <Button
            kind="primary"
            icon="chart"
            label="The whole report of this fit"
            href={`/shells/${shell.id}/fits/${shown.id}`}
          />
        </View>
      </View>
    ) : (
      <Panel>
        <EmptyState icon="target" title="No fit yet" action={<OpenInCube shell={shell} />}>
          {shell.readings.length === 0
            ? 'Open the shell in a cube and click or tap points on its rim, on three channels or more.'
            : 'The shell carries marks. Open it in its cube and run the fit of record.'}
        </EmptyState>
      </Panel>
    );
  return (
    <>
      {shell.status === 'withdrawn' && (
        <Notice kind="person">This shell is withdrawn: it stays on record and out of the catalogue.</Notice>
      )}
      {shell.note ? <Text tone="quiet">{shell.note}</Text> : null}
      {wide ? (
        <View style={{ flexDirection: 'row', gap: space(4), alignItems: 'flex-start' }}>
          <View style={{ flex: 1, minWidth: 0, gap: space(4) }}>{summary}</View>
          <View style={{ width: space(96) }}>{side}</View>
        </View>
      ) : (
        <View style={{ gap: space(4) }}>
          {summary}
          {side}
        </View>
      )}
    </>
  );
}

function Readings({ shell }: { shell: Shell }) {
  return (
    <Panel title="Readings">
      {shell.readings.length === 0 ? (
        <Text tone="quiet">Nobody has marked this shell yet.</Text>
      ) : (
        shell.readings.map((r) => (
          <View
            key={r.id}
            style={{ flexDirection: 'row', alignItems: 'center', gap: space(2), flexWrap: 'wrap' }}
          >
            <Text weight="semibold" style={{ flexGrow: 1 }}>
              {r.person.name}
            </Text>
            <Text mono size="small" tone="quiet">
              {`${count(r.marks, 'mark')} · ${count(r.channels, 'channel')} · ${ago(r.updatedAt)}`}
            </Text>
            {r.mine && <Chip label="yours" kind="person" />}
          </View>
        ))
      )}
    </Panel>
  );
}
