import { View } from 'react-native';
import { useFitActions } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import type { Fit } from '@/shared/contract/fits';
import { Button } from '../ui/Button';
import { ProblemNotice } from '../ui/ProblemNotice';
import { ProgressBar } from '../ui/ProgressBar';
import { space } from '../ui/tokens';
import { useActing } from './useActing';

/** How far a fit is, with a way to stop it; why it failed or that it was stopped, with a way to run it again. */
export function FitProgress({ fit }: { fit: Fit }) {
  const may = useMay()('fit.run');
  const { cancel, retry } = useFitActions();
  const { busy, act } = useActing();
  if (fit.status === 'queued' || fit.status === 'running')
    return (
      <View style={{ flexDirection: 'row', gap: space(3), alignItems: 'center' }}>
        <View style={{ flex: 1 }}>
          <ProgressBar
            label="Fit"
            value={fit.status === 'queued' ? 0 : fit.progress}
            activity={fit.activity ?? (fit.status === 'queued' ? 'Waiting for a worker' : 'Fitting')}
          />
        </View>
        {may && <Button label="Stop" busy={busy} onPress={() => act('Stopping', () => cancel(fit.id))} />}
      </View>
    );
  if (fit.status === 'failed' || fit.status === 'cancelled')
    return (
      <ProblemNotice
        problem={fit.problem ?? { title: fit.status === 'failed' ? 'The fit failed' : 'The fit was stopped' }}
        onRetry={may ? () => act('Running again', () => retry(fit.id)) : undefined}
        retryLabel="Run again"
        busy={busy}
      />
    );
  return null;
}
