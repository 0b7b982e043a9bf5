import { useRouter } from 'expo-router';
import type { Shell } from '@/shared/contract/shells';
import { asProblem } from '@/hooks/api';
import { useMay } from '@/hooks/useMe';
import { useShellActions } from '@/hooks/useShells';
import type { MenuItem } from '../ui/Menu';
import { useToast } from '../ui/Toast';

/** Withdraw, bring back, take out: each with its undo. */
export function useShellMenu(shell: Shell): MenuItem[] {
  const may = useMay();
  const { change, remove, restore } = useShellActions();
  const say = useToast();
  const router = useRouter();
  const act = async (what: string, action: () => Promise<unknown>) => {
    try {
      await action();
    } catch (error) {
      const problem = asProblem(error);
      say({ kind: 'error', text: `${what} did not work: ${problem.detail || problem.title}` });
    }
  };
  const back = () => act('Bringing it back', () => change(shell.id, { status: 'draft' }));
  const withdraw = () =>
    act('Withdrawing', async () => {
      await change(shell.id, { status: 'withdrawn' });
      say({ text: `${shell.name} was withdrawn.`, action: { label: 'Undo', perform: () => void back() } });
    });
  const takeOut = () =>
    act('Taking it out', async () => {
      await remove(shell);
      router.replace(`/regions/${shell.regionId}`);
      say({
        text: `${shell.name} was taken out of the lists.`,
        action: { label: 'Undo', perform: () => void act('Putting it back', () => restore(shell.id)) },
      });
    });
  if (!may('shell.edit')) return [];
  return [
    shell.status === 'withdrawn'
      ? { label: 'Bring back as draft', icon: 'undo', perform: () => void back() }
      : { label: 'Withdraw', icon: 'minus', perform: () => void withdraw() },
    { label: 'Take out of the lists', icon: 'trash', danger: true, perform: () => void takeOut() },
  ];
}
