import { useRouter } from 'expo-router';
import { useState } from 'react';
import { asProblem, type ApiProblem } from '@/hooks/api';
import { useFitActions } from '@/hooks/useFits';
import type { FitDraft } from '@/shared/contract/fits';

/** Queues a fit and goes to its page, where its progress shows; a refusal stays where it was asked. */
export function useStartFit(shellId: string): {
  start: (draft: FitDraft) => Promise<void>;
  busy: boolean;
  problem: ApiProblem | null;
} {
  const router = useRouter();
  const { run } = useFitActions();
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  async function start(draft: FitDraft) {
    setBusy(true);
    setProblem(null);
    try {
      const fit = await run(shellId, draft);
      router.push(`/shells/${shellId}/fits/${fit.id}`);
    } catch (error) {
      setProblem(asProblem(error));
    } finally {
      setBusy(false);
    }
  }
  return { start, busy, problem };
}
