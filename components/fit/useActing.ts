import { useState } from 'react';
import { asProblem } from '@/hooks/api';
import { useToast } from '../ui/Toast';

/** Tries something that a press asked for; while it goes the button is busy, and a refusal is said in a toast. */
export function useActing(): { busy: boolean; act: (what: string, action: () => Promise<unknown>) => void } {
  const say = useToast();
  const [busy, setBusy] = useState(false);
  async function go(what: string, action: () => Promise<unknown>) {
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
  return { busy, act: (what, action) => void go(what, action) };
}
