import { useEffect, useRef, useState } from 'react';
import { View } from 'react-native';
import { ConflictNotice } from '@/components/cube/ConflictNotice';
import { GhostList } from '@/components/cube/GhostList';
import { Headline } from '@/components/cube/Headline';
import { LivePanel } from '@/components/cube/LivePanel';
import { LookPanel } from '@/components/cube/LookPanel';
import { MapPanel } from '@/components/cube/MapPanel';
import { MarkDetails } from '@/components/cube/MarkDetails';
import { MarkHint } from '@/components/cube/MarkHint';
import { MarkList } from '@/components/cube/MarkList';
import { ReadingTable } from '@/components/cube/ReadingTable';
import { RecordPanel } from '@/components/cube/RecordPanel';
import { RunFit } from '@/components/cube/RunFit';
import { useSession } from '@/components/cube/session';
import { ShellChooser } from '@/components/cube/ShellChooser';
import { StripPanel } from '@/components/cube/StripPanel';
import { Tools } from '@/components/cube/Tools';
import type { RecordFit } from '@/components/cube/useRecordFit';
import { Slices } from '@/components/slices/Slices';
import { Sheet } from '@/components/ui/Sheet';
import { SkeletonRows } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { layout, space } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';

/** Longest that the lists wait for rings: marks off the sky never get any. */
const LATE_MS = 2000;

/** The map fills the width, the strip lies under the thumb, a sheet holds marks, fit and results. */
export function PhoneCube({
  record,
  look,
}: {
  record: RecordFit;
  look: { open: boolean; toggle: () => void };
}) {
  const { shell, hasReading, modelSource, reading, marks, live } = useSession();
  // the marks of the first picture come together with their rings, so that the lists do not grow under the thumb
  const settled = useRef(false);
  const [late, setLate] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLate(true), LATE_MS);
    return () => clearTimeout(timer);
  }, []);
  const { state, problem } = reading;
  settled.current ||=
    late ||
    !hasReading ||
    problem !== null ||
    (state.ready && (marks.length === 0 || live.readings.length > 0));
  const { width, height } = useWide();
  const [tab, setTab] = useState('marks');
  const lying = width > height; // a phone on its side: the sheet goes beside the map
  const room = height - layout.topBar - layout.tabBar;

  const map = (
    <View style={lying ? { flex: 1, minHeight: 0 } : { height: Math.round(Math.min(width, room * 0.54)) }}>
      <MapPanel round={false} />
    </View>
  );
  const strip = (
    <View>
      <View
        style={{
          flexDirection: 'row',
          alignItems: 'center',
          justifyContent: 'space-between',
          paddingLeft: space(3),
          paddingRight: space(1),
          minHeight: space(12),
        }}
      >
        <Headline compact />
        <Tools compact lookOpen={look.open} onLook={look.toggle} />
      </View>
      <StripPanel />
    </View>
  );
  const notices = (
    <>
      <ConflictNotice />
      <MarkHint />
    </>
  );
  const sheet = (
    <Sheet
      label="Marks, fit and results"
      tab={tab}
      onTab={setTab}
      aside={
        <Text size="small" tone="quiet">
          {modelSource ? `${modelSource === 'record' ? 'of record' : modelSource}, sphere` : ''}
        </Text>
      }
      tabs={[
        {
          key: 'marks',
          label: 'Marks',
          content: (
            <>
              {notices}
              {settled.current ? (
                <>
                  {hasReading && <ReadingTable />}
                  {hasReading && <MarkDetails />}
                  {hasReading && <MarkList />}
                  {hasReading && <GhostList />}
                  <ShellChooser />
                </>
              ) : (
                <SkeletonRows rows={5} label="Loading your marks" />
              )}
            </>
          ),
        },
        {
          key: 'fit',
          label: 'Fit',
          content: (
            <>
              {notices}
              <LivePanel diagramHeight={240} numbersFirst />
              <RunFit record={record} />
            </>
          ),
        },
        { key: 'slice', label: 'Slice', content: <Slices height={230} /> },
        {
          key: 'results',
          label: 'Results',
          content: shell ? (
            <>
              <RecordPanel record={record} />
              {record.newest?.status !== 'queued' && record.newest?.status !== 'running' && (
                <RunFit record={record} />
              )}
            </>
          ) : (
            <Text tone="quiet">Choose a shell under Marks; its fits of record stand here.</Text>
          ),
        },
      ]}
    />
  );
  const over = look.open && (
    <View
      pointerEvents="box-none"
      style={{
        position: 'absolute',
        left: space(2),
        right: space(2),
        top: space(2),
        bottom: space(2),
        zIndex: 3,
        alignItems: lying ? 'flex-end' : 'center', // beside the map where there is a beside
        justifyContent: 'flex-end',
      }}
    >
      <LookPanel onClose={look.toggle} />
    </View>
  );

  if (lying)
    return (
      <View style={{ flex: 1, flexDirection: 'row', minHeight: 0 }}>
        {map}
        <View style={{ width: Math.max(width * 0.48, 300), minHeight: 0 }}>
          {strip}
          {sheet}
        </View>
        {over}
      </View>
    );
  return (
    <View style={{ flex: 1, minHeight: 0 }}>
      {map}
      {strip}
      {sheet}
      {over}
    </View>
  );
}
