import { View } from 'react-native';
import type { Parameter } from '@/shared/contract/fits';
import type { Shell } from '@/shared/contract/shells';
import { Button } from '../ui/Button';
import { count } from '../ui/format';
import { Panel } from '../ui/Panel';
import { ParameterName } from '../ui/Quantity';
import { Text } from '../ui/Text';
import { space } from '../ui/tokens';

/** Difference of two numbers in units of their joint error; null where an error is not known. */
export function inSigma(a: Parameter | null | undefined, b: Parameter | null | undefined): number | null {
  if (!a || !b || a.se === null || b.se === null) return null;
  const joint = Math.hypot(a.se, b.se);
  return joint > 0 ? Math.abs(a.value - b.value) / joint : null;
}

/** What is picked for comparison; two shells already say how far apart they are. */
export function PickBar({ picked, onClear }: { picked: readonly Shell[]; onClear: () => void }) {
  const [a, b] = picked;
  if (!a) return null;
  const pair = picked.length === 2 && b ? { a, b } : null;
  const differences = pair
    ? (['radius', 'vExp'] as const).flatMap((key) => {
        const sigma = inSigma(pair.a.adopted?.[key], pair.b.adopted?.[key]);
        return sigma === null ? [] : [{ key, sigma }];
      })
    : [];
  return (
    <Panel>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space(4) }}>
        <View style={{ flexGrow: 1, flexShrink: 1, flexBasis: space(40) }}>
          <Text weight="semibold">
            {pair ? `${pair.a.name} – ${pair.b.name}` : picked.map((s) => s.name).join(', ')}
          </Text>
          <Text size="small" tone="quiet">
            {pair
              ? 'differences in units of their joint error'
              : picked.length === 1
                ? 'pick one to three more to compare'
                : `${count(picked.length, 'shell')} picked`}
          </Text>
        </View>
        {differences.map(({ key, sigma }) => (
          <View key={key} style={{ flexDirection: 'row', gap: space(1.5), alignItems: 'baseline' }}>
            <Text>
              Δ<ParameterName name={key} />
            </Text>
            <Text mono>{sigma > 99 ? '> 99' : sigma.toFixed(1)}σ</Text>
          </View>
        ))}
        <View style={{ flexDirection: 'row', gap: space(2) }}>
          <Button kind="quiet" label="Clear" onPress={onClear} />
          {picked.length > 1 && (
            <Button
              kind="primary"
              icon="compare"
              label="Compare"
              href={`/compare?ids=${picked.map((s) => s.id).join(',')}`}
            />
          )}
        </View>
      </View>
    </Panel>
  );
}
