import type { ReactNode } from 'react';
import { View } from 'react-native';
import { useFitDraws, useFitMarks } from '@/hooks/useFits';
import { space } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { ApartPanel } from './ApartPanel';
import { ComparisonPanel } from './ComparisonPanel';
import { CornerPanel } from './CornerPanel';
import { CorrelationTable } from './CorrelationTable';
import type { DoneFit } from './fitFacts';
import { FitSummary } from './FitSummary';
import { LeaveOneOutPanel } from './LeaveOneOutPanel';
import { MethodsPanel } from './MethodsPanel';
import { OutlierPanel } from './OutlierPanel';
import { ProfilePanel } from './ProfilePanel';
import { Provenance } from './Provenance';
import { ResidualMap } from './ResidualMap';
import { ResidualTable } from './ResidualTable';
import { RingTable } from './RingTable';
import { ScatterPanel } from './ScatterPanel';
import { TracePanel } from './TracePanel';

/** All that a referee may ask of a fit, the numbers first. Parts that an old fit was made without are left out. */
export default function FitReport({ fit, name }: { fit: DoneFit; name: string }) {
  const draws = useFitDraws(fit.errorBars === 'bootstrap' ? fit.id : null);
  const channelWidth = useFitMarks(fit.id).data?.channelWidth ?? 0;
  const { wide } = useWide();
  const left = (
    <>
      <ScatterPanel fit={fit} />
      <ResidualMap fit={fit} name={name} />
      <OutlierPanel fit={fit} />
      <ResidualTable fit={fit} />
      <TracePanel fit={fit} />
      <ApartPanel fit={fit} />
    </>
  );
  const right = (
    <>
      <CornerPanel fit={fit} draws={draws} name={name} />
      <ProfilePanel fit={fit} />
      <CorrelationTable correlation={fit.correlation} />
      <RingTable fit={fit} channelWidth={channelWidth} />
    </>
  );
  return (
    <View style={{ gap: space(4), alignSelf: 'stretch' }}>
      <FitSummary fit={fit} name={name} draws={draws.data} />
      <ComparisonPanel fit={fit} />
      <LeaveOneOutPanel fit={fit} channelWidth={channelWidth} />
      <Columns wide={wide} left={left} right={right} />
      <Columns wide={wide} left={<MethodsPanel fit={fit} name={name} />} right={<Provenance fit={fit} />} />
    </View>
  );
}

function Columns({ wide, left, right }: { wide: boolean; left: ReactNode; right: ReactNode }) {
  const column = [{ gap: space(4), alignSelf: 'stretch' as const }, wide && { flex: 1, minWidth: 0 }];
  return (
    <View style={{ flexDirection: wide ? 'row' : 'column', gap: space(4), alignItems: 'flex-start' }}>
      <View style={column}>{left}</View>
      <View style={column}>{right}</View>
    </View>
  );
}
