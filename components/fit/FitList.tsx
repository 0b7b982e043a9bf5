import { Fragment, useState } from 'react';
import { View } from 'react-native';
import type { Fit } from '@/shared/contract/fits';
import { asProblem } from '@/hooks/api';
import { useFitActions, useFits } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import { useShellActions } from '@/hooks/useShells';
import { RecordGate } from '../frame/RecordGate';
import { Button } from '../ui/Button';
import { Chip, StatusChip } from '../ui/Chip';
import { ago } from '../ui/format';
import { Panel, Rule } from '../ui/Panel';
import { Press, type PressState } from '../ui/Press';
import { ProblemNotice } from '../ui/ProblemNotice';
import { ProgressBar } from '../ui/ProgressBar';
import { SkeletonRows } from '../ui/Skeleton';
import { Text } from '../ui/Text';
import { useTheme } from '../ui/theme';
import { useToast } from '../ui/Toast';
import { space, touch } from '../ui/tokens';
import { chi2PerDof, isDone, modelNames } from './fitFacts';

/** The fits of record of a shell; choosing one shows its report, and one of them stands for the shell. */
export function FitList({
  shellId,
  shown,
  onShow,
}: {
  shellId: string;
  shown: string | null;
  onShow: (fitId: string) => void;
}) {
  const fits = useFits(shellId);
  return (
    <Panel
      flush
      title="Fits of record"
      aside={
        fits.data?.items.length ? (
          <Text mono tone="quiet">
            {fits.data.items.length}
          </Text>
        ) : undefined
      }
    >
      <RecordGate
        read={fits}
        what="fits"
        skeleton={
          <View style={{ padding: space(4) }}>
            <SkeletonRows rows={2} />
          </View>
        }
      >
        {({ items }) =>
          items.length === 0 ? (
            <Text tone="quiet" style={{ padding: space(4), paddingTop: 0 }}>
              None yet. Open the shell in a cube, mark its rim on three channels or more, and run the fit of
              record.
            </Text>
          ) : (
            <View role="list" aria-label="Fits of record">
              {items.map((fit, i) => (
                <Fragment key={fit.id}>
                  {i > 0 && <Rule />}
                  <FitRow fit={fit} shown={fit.id === shown} onShow={() => onShow(fit.id)} />
                </Fragment>
              ))}
            </View>
          )
        }
      </RecordGate>
    </Panel>
  );
}

function FitRow({ fit, shown, onShow }: { fit: Fit; shown: boolean; onShow: () => void }) {
  const { color } = useTheme();
  const may = useMay();
  const { cancel, retry } = useFitActions();
  const { change } = useShellActions();
  const say = useToast();
  const [busy, setBusy] = useState(false);
  async function act(what: string, action: () => Promise<unknown>) {
    setBusy(true);
    try {
      await action();
    } catch (error) {
      const problem = asProblem(error);
      say({ kind: 'error', text: `${what} did not work: ${problem.detail || problem.title}` });
    } finally {
      setBusy(false);
    }
  }
  const going = fit.status === 'queued' || fit.status === 'running';
  const quality = isDone(fit) ? chi2PerDof(fit) : null;
  const words = [modelNames[fit.model], quality !== null && `χ²/dof ${quality.toFixed(2)}`]
    .filter(Boolean)
    .join(' · ');
  return (
    <View
      role="listitem"
      style={{
        backgroundColor: shown ? color.selected : 'transparent',
        gap: space(2),
        paddingBottom: going || fit.problem ? space(3) : 0,
      }}
    >
      <View style={{ flexDirection: 'row', alignItems: 'center', gap: space(2), paddingRight: space(3) }}>
        <Press
          onPress={onShow}
          disabled={fit.status !== 'done'}
          aria-pressed={shown}
          style={({ hovered }: PressState) => ({
            flex: 1,
            minHeight: touch + space(2),
            justifyContent: 'center',
            paddingLeft: space(4),
            opacity: hovered ? 0.85 : 1,
          })}
        >
          <Text weight={shown ? 'semibold' : 'regular'}>{words}</Text>
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
            onPress={() => void act('Adopting', () => change(fit.shellId, { adoptedFitId: fit.id }))}
          />
        )}
        {fit.adopted && may('fit.adopt') && (
          <Button
            kind="quiet"
            label="Let go"
            busy={busy}
            onPress={() => void act('Letting go', () => change(fit.shellId, { adoptedFitId: null }))}
          />
        )}
      </View>
      {going && (
        <View
          style={{ flexDirection: 'row', gap: space(2), alignItems: 'center', paddingHorizontal: space(4) }}
        >
          <View style={{ flex: 1 }}>
            <ProgressBar
              label="Fit"
              value={fit.status === 'running' ? null : 0}
              activity={fit.status === 'running' ? 'Fitting' : 'Waiting for a worker'}
            />
          </View>
          {may('fit.run') && (
            <Button label="Stop" busy={busy} onPress={() => void act('Stopping', () => cancel(fit.id))} />
          )}
        </View>
      )}
      {fit.status === 'done' && !fit.adoptable && (
        <Text size="small" tone="quiet" style={{ paddingHorizontal: space(4), paddingBottom: space(2) }}>
          Its marks do not measure the radius, so it cannot stand for the shell.
        </Text>
      )}
      {(fit.status === 'failed' || fit.status === 'cancelled') && (
        <View style={{ paddingHorizontal: space(3) }}>
          <ProblemNotice
            problem={fit.problem ?? { title: 'The fit was stopped' }}
            onRetry={may('fit.run') ? () => void act('Running again', () => retry(fit.id)) : undefined}
            retryLabel="Run again"
            busy={busy}
          />
        </View>
      )}
    </View>
  );
}
