import { useCallback, useState } from 'react';
import type { CubeSession } from '@/components/cube/cubeSession';
import { ApiProblem, asProblem } from '@/hooks/api';
import { useFitActions, useFits } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import { useShellActions } from '@/hooks/useShells';
import type { Fit } from '@/shared/contract/fits';

export interface RecordFit {
  /** The newest fit of record; the adopted one may be another. */
  newest: Fit | null;
  waiting: boolean;
  /** Of the last thing tried here: running, stopping, adopting. */
  problem: ApiProblem | null;
  busy: boolean;
  /** Why it cannot be run now; null when it can. */
  obstacle: string | null;
  mayAdopt: boolean;
  run: () => Promise<void>;
  cancel: () => Promise<void>;
  retry: () => Promise<void>;
  adopt: (on: boolean) => Promise<void>;
}

const underWay = (fit: Fit | null) => fit?.status === 'queued' || fit?.status === 'running';

/** The fit of record: saved marks are frozen, the worker fits them, the answer comes with the live events. */
export function useRecordFit(s: CubeSession): RecordFit {
  const may = useMay();
  const fits = useFits(s.shell?.id ?? null);
  const actions = useFitActions();
  const { change } = useShellActions();
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  const [busy, setBusy] = useState(false);
  const newest = fits.data?.items[0] ?? null;
  const { reading, shell, live } = s;

  const tried = useCallback(async (what: () => Promise<unknown>) => {
    setBusy(true);
    setProblem(null);
    try {
      await what();
    } catch (error) {
      setProblem(asProblem(error));
    } finally {
      setBusy(false);
    }
  }, []);

  const obstacle = !shell
    ? 'Choose a shell first.'
    : !may('fit.run')
      ? 'Your role does not run fits.'
      : s.elsewhere
        ? 'Your marks of this shell lie on another cube.'
        : underWay(newest)
          ? 'A fit is under way.'
          : live.fit
            ? null
            : live.problem
              ? live.problem.title
              : 'It needs six marks on three channels.';

  return {
    newest,
    waiting: fits.waiting,
    problem: problem ?? fits.problem,
    busy,
    obstacle,
    mayAdopt: may('fit.adopt'),
    run: () =>
      tried(async () => {
        if (!shell) return;
        const readingId = await reading.flush();
        if (!readingId)
          throw new ApiProblem({
            type: 'conflict',
            status: 0,
            title: 'The marks are not saved yet',
            detail: 'A fit of record is made from saved marks. Once they are saved, run it again.',
          });
        await actions.run(shell.id, {
          readingId,
          model: 'sphere',
          options: { setAside: true, bootstrap: 500, seed: 1 },
        });
      }),
    cancel: () => tried(async () => newest && actions.cancel(newest.id)),
    retry: () => tried(async () => newest && actions.retry(newest.id)),
    adopt: (on) =>
      tried(async () => newest && shell && change(shell.id, { adoptedFitId: on ? newest.id : null })),
  };
}
