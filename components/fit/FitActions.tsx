import { lazy, Suspense, useState } from 'react';
import { useRouter } from 'expo-router';
import { useFitActions } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import { useShellActions } from '@/hooks/useShells';
import type { Shell } from '@/shared/contract/shells';
import { Button } from '../ui/Button';
import type { DoneFit } from './fitFacts';
import { formOf } from './fitForm';
import { useActing } from './useActing';

const FitDialog = lazy(() => import('./FitDialog'));

/** Adopt a fit or let it go; fit again with something changed. */
export function FitActions({ fit, shell }: { fit: DoneFit; shell: Shell }) {
  const may = useMay();
  const router = useRouter();
  const { change } = useShellActions();
  const { run } = useFitActions();
  const { busy, act } = useActing();
  const [asking, setAsking] = useState(false);
  const adopt = (id: string | null) => change(shell.id, { adoptedFitId: id });
  return (
    <>
      {may('fit.adopt') &&
        (fit.adopted ? (
          <Button
            kind="quiet"
            label="Let go"
            busy={busy}
            onPress={() => act('Letting go', () => adopt(null))}
          />
        ) : (
          fit.adoptable && (
            <Button
              kind="primary"
              label="Adopt this fit"
              busy={busy}
              onPress={() => act('Adopting', () => adopt(fit.id))}
            />
          )
        ))}
      {may('fit.run') && <Button label="Fit again…" onPress={() => setAsking(true)} />}
      {asking && (
        <Suspense fallback={null}>
          <FitDialog
            shell={shell}
            start={formOf(fit)}
            onClose={() => setAsking(false)}
            onRun={async (draft) => {
              const next = await run(shell.id, draft);
              router.push(`/shells/${shell.id}/fits/${next.id}`);
            }}
          />
        </Suspense>
      )}
    </>
  );
}
