import { View } from 'react-native';
import { useFitMarks } from '@/hooks/useFits';
import { Panel } from '../ui/Panel';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';
import { extraOf } from './fitExtra';
import type { DoneFit } from './fitFacts';
import { scatterSources } from './scatterWords';

/** The four sources of scatter behind the error bars, and why the fit stopped. */
export function ScatterPanel({ fit }: { fit: DoneFit }) {
  const { scales, sigmaUsedDeg, convergence } = extraOf(fit);
  const frozen = useFitMarks(fit.id).data;
  if (!scales || !sigmaUsedDeg) return null;
  const stated = frozen?.marks.some((m) => m.sigma !== null) ?? true;
  return (
    <Panel title="What the error bars are made of">
      {scatterSources(scales, sigmaUsedDeg, stated, fit.traceId !== null).map((source) => (
        <View key={source.key} style={{ gap: space(0.5) }}>
          <Text weight="semibold">{source.title}</Text>
          <Text>{source.sentence}</Text>
        </View>
      ))}
      {convergence && (
        <View style={{ gap: space(0.5) }}>
          <Text weight="semibold">How the fit ended</Text>
          <Text>{convergence.sentence}</Text>
        </View>
      )}
    </Panel>
  );
}
