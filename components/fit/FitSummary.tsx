import { View } from 'react-native';
import type { FitDraws } from '@/shared/contract/fits';
import { Panel } from '../ui/Panel';
import { Notice } from '../ui/ProblemNotice';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { useWide } from '../ui/useWide';
import { FitDiagram } from './FitDiagram';
import { modelNames, type DoneFit } from './fitFacts';
import { ParameterRows } from './ParameterRows';

/** The numbers with their errors and limits, the curve they draw, and what to beware of. */
export function FitSummary({
  fit,
  name,
  draws,
}: {
  fit: DoneFit;
  name: string;
  draws?: FitDraws | undefined;
}) {
  const { wide } = useWide();
  return (
    <View style={{ gap: space(4) }}>
      <View style={{ flexDirection: wide ? 'row' : 'column', gap: space(4), alignItems: 'stretch' }}>
        <Panel
          title="Parameters"
          aside={
            <Text tone="quiet" size="small">
              {modelNames[fit.model]}
            </Text>
          }
          style={wide ? { flex: 1 } : undefined}
        >
          <ParameterRows fit={fit} />
        </Panel>
        <FitDiagram fit={fit} name={name} draws={draws} fill={wide} />
      </View>
      {fit.warnings.map((w) => (
        <Notice key={w.code} kind="person">
          {w.message}
        </Notice>
      ))}
    </View>
  );
}
