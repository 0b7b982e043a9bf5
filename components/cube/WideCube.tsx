import { ScrollView, View } from 'react-native';
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
import { SecondMap } from '@/components/seeing/SecondMap';
import { Slices } from '@/components/slices/Slices';
import { Rule } from '@/components/ui/Panel';
import { useTheme } from '@/components/ui/theme';
import { breakpoints, hairline, space } from '@/components/ui/tokens';
import { useWide } from '@/components/ui/useWide';

/** Side columns: comfortable from 1180 px on, narrow below, so that the map keeps the middle. */
const COLUMNS = { from: 1180, roomy: 1560, full: 1800, wide: [272, 348], narrow: [224, 276] } as const;

/** Three columns: shells and reading; map over strip; diagram, parameters and results. */
export function WideCube({
  record,
  look,
}: {
  record: RecordFit;
  look: { open: boolean; toggle: () => void };
}) {
  const { shell, hasReading, seeing } = useSession();
  const { color } = useTheme();
  const { width, height } = useWide();
  const [left, right] = width >= COLUMNS.from ? COLUMNS.wide : COLUMNS.narrow;
  const edge = { borderColor: color.line, backgroundColor: color.panel };
  return (
    <View style={{ flex: 1, flexDirection: 'row', minHeight: 0 }}>
      <View
        role="complementary"
        aria-label="Shells and reading"
        style={{ width: left, borderRightWidth: hairline, ...edge }}
      >
        <ScrollView contentContainerStyle={{ padding: space(3), gap: space(5) }}>
          <MarkHint />
          <ShellChooser />
          {hasReading && <ReadingTable />}
          {hasReading && <MarkDetails />}
          {hasReading && <MarkList />}
          {hasReading && <GhostList />}
        </ScrollView>
      </View>
      <View style={{ flex: 1, minWidth: 0, padding: space(4), paddingBottom: space(2), gap: space(2) }}>
        <View
          style={{
            flexDirection: 'row',
            alignItems: 'center',
            justifyContent: 'space-between',
            gap: space(3),
            zIndex: 2,
          }}
        >
          <Headline compact={width < COLUMNS.from} />
          <Tools
            lookOpen={look.open}
            onLook={look.toggle}
            compact={width < COLUMNS.from}
            roomy={width >= COLUMNS.roomy}
            full={width >= COLUMNS.full}
          />
        </View>
        <ConflictNotice />
        <View style={{ flex: 1, minHeight: space(40) }}>
          <View style={{ flex: 1, flexDirection: 'row', gap: space(2) }}>
            <MapPanel />
            {seeing.second && width >= breakpoints.roomy && <SecondMap />}
          </View>
          {look.open && (
            <View
              pointerEvents="box-none"
              style={{
                position: 'absolute',
                top: space(2),
                bottom: space(2),
                right: space(2),
                left: space(2),
                alignItems: 'flex-end',
              }}
            >
              <LookPanel onClose={look.toggle} />
            </View>
          )}
        </View>
        {seeing.slice && <Slices height={Math.min(Math.max(height * 0.2, 150), 260)} closable />}
        <StripPanel />
      </View>
      <View
        role="complementary"
        aria-label="Fit"
        style={{ width: right, borderLeftWidth: hairline, ...edge }}
      >
        <ScrollView style={{ flex: 1 }} contentContainerStyle={{ padding: space(3), gap: space(4) }}>
          <LivePanel diagramHeight={Math.min(Math.max(height * 0.34, 220), 340)} />
          {shell && <Rule />}
          <RecordPanel record={record} />
        </ScrollView>
        <View style={{ padding: space(3), borderTopWidth: hairline, borderTopColor: color.line }}>
          <RunFit record={record} />
        </View>
      </View>
    </View>
  );
}
