import { View } from 'react-native';
import { useMay } from '@/hooks/useMe';
import { useShellActions } from '@/hooks/useShells';
import type { Fit } from '@/shared/contract/fits';
import { Button } from '../ui/Button';
import { Chip, StatusChip } from '../ui/Chip';
import { ago } from '../ui/format';
import { Press, type PressState } from '../ui/Press';
import { Text } from '../ui/Text';
import { space, touch } from '../ui/tokens';
import { chi2PerDof, isDone } from './fitFacts';
import { FitProgress } from './FitProgress';
import { useActing } from './useActing';

/** A fit in a list: what tells it apart, who ran it, its state; while it runs, how far it is. */
export function FitRow({ fit, apart }: { fit: Fit; apart: readonly string[] }) {
  const may = useMay();
  const { change } = useShellActions();
  const { busy, act } = useActing();
  const quality = isDone(fit) ? chi2PerDof(fit) : null;
  const [model, ...rest] = apart;
  const more = fit.status !== 'done' || !fit.adoptable;
  return (
    <View role="listitem" style={{ gap: space(2), paddingBottom: more ? space(3) : 0 }}>
      <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2), paddingRight: space(3) }}>
        <Press
          href={`/shells/${fit.shellId}/fits/${fit.id}`}
          style={({ hovered }: PressState) => ({
            flex: 1,
            minWidth: 0,
            minHeight: touch + space(2),
            justifyContent: 'center',
            paddingLeft: space(4),
            paddingVertical: space(2),
            opacity: hovered ? 0.8 : 1,
          })}
        >
          <Text weight="semibold" style={{ textDecorationLine: 'underline' }}>
            {[model, quality !== null && `χ²/dof ${quality.toFixed(2)}`].filter(Boolean).join(' · ')}
          </Text>
          {rest.length > 0 && <Text size="small">{rest.join(' · ')}</Text>}
          <Text size="small" tone="quiet" numberOfLines={1}>
            {[fit.createdBy?.name, ago(fit.createdAt)].filter(Boolean).join(', ')}
          </Text>
        </Press>
        {fit.adopted ? (
          <Chip label="adopted" kind="model" icon="check" />
        ) : (
          <StatusChip status={fit.status} />
        )}
        {fit.status === 'done' && !fit.adopted && may('fit.adopt') && fit.adoptable && (
          <Button
            label="Adopt"
            busy={busy}
            onPress={() => act('Adopting', () => change(fit.shellId, { adoptedFitId: fit.id }))}
          />
        )}
        {fit.adopted && may('fit.adopt') && (
          <Button
            kind="quiet"
            label="Let go"
            busy={busy}
            onPress={() => act('Letting go', () => change(fit.shellId, { adoptedFitId: null }))}
          />
        )}
      </View>
      {fit.status !== 'done' ? (
        <View style={{ paddingHorizontal: space(4) }}>
          <FitProgress fit={fit} />
        </View>
      ) : (
        !fit.adoptable && (
          <Text size="small" tone="quiet" style={{ paddingHorizontal: space(4) }}>
            Its marks do not measure the radius, so it cannot stand for the shell.
          </Text>
        )
      )}
    </View>
  );
}
