import { useCallback, useState } from 'react';
import type { CubeSession } from '@/components/cube/cubeSession';
import { defaultForm, readFitForm } from '@/components/fit/fitForm';
import { ApiProblem, asProblem } from '@/hooks/api';
import { useFitActions, useFits } from '@/hooks/useFits';
import { useMay } from '@/hooks/useMe';
import { useShellActions } from '@/hooks/useShells';
import type { Fit, FitDraft } from '@/shared/contract/fits';

export interface RecordFit {
  /** The newest fit of record; the adopted one may be another. */
  newest: Fit | null;
  waiting: boolean;
  /** Of the last thing tried here: running, adopting. */
  problem: ApiProblem | null;
  busy: boolean;
  /** Why it cannot be run now; null when it can. */
  obstacle: string | null;
  /** Whether a fit can be asked for with settings of one's own: a traced rim needs no marks of mine. */
  mayChoose: boolean;
  /** Of my marks; null while none was saved. */
  readingId: string | null;
  mayAdopt: boolean;
  /** Freezes my marks and fits them with the usual settings. */
  run: () => Promise<void>;
  /** Saves my marks, then queues a fit as it was asked for; throws what stood in the way. */
  runAs: (draft: FitDraft) => Promise<void>;
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

  /** The id of my reading, once its last change is saved. */
  async function savedMarks(): Promise<string> {
    const readingId = await reading.flush();
    if (readingId) return readingId;
    throw new ApiProblem({
      type: 'conflict',
      status: 0,
      title: 'The marks are not saved yet',
      detail: 'A fit of record is made from saved marks. Once they are saved, run it again.',
    });
  }

  const barred = !shell
    ? 'Choose a shell first.'
    : !may('fit.run')
      ? 'Your role does not run fits.'
      : s.elsewhere
        ? 'Your marks of this shell lie on another cube.'
        : underWay(newest)
          ? 'A fit is under way.'
          : null;
  const obstacle =
    barred ?? (live.fit ? null : live.problem ? live.problem.title : 'It needs six marks on three channels.');

  return {
    newest,
    waiting: fits.waiting,
    problem: problem ?? fits.problem,
    busy,
    obstacle,
    mayChoose: barred === null,
    readingId: reading.state.readingId,
    mayAdopt: may('fit.adopt'),
    run: () =>
      tried(async () => {
        if (!shell) return;
        const usual = readFitForm(defaultForm(await savedMarks(), s.fitStart));
        if ('draft' in usual) await actions.run(shell.id, usual.draft);
      }),
    runAs: async (draft) => {
      setProblem(null);
      // a traced rim lies still; only my own marks may have unsaved changes
      if (draft.readingId === reading.state.readingId) await savedMarks();
      if (shell) await actions.run(shell.id, draft);
    },
    adopt: (on) =>
      tried(async () => newest && shell && change(shell.id, { adoptedFitId: on ? newest.id : null })),
  };
}
