import { createContext, useContext, useEffect, useMemo, useRef, useState, type ReactNode } from 'react';
import { Platform } from 'react-native';
import { commandFor, type Command } from './command';
import { KeysDialog } from './KeysDialog';

interface Registry {
  set: (owner: symbol, commands: readonly Command[] | null) => void;
  showKeys: () => void;
}
const Context = createContext<Registry | null>(null);

/** Makes commands live while the calling component is shown; pass a fresh array each render, it costs nothing. */
export function useCommands(commands: readonly Command[]) {
  const registry = useContext(Context);
  const owner = useRef(Symbol('commands'));
  useEffect(() => registry?.set(owner.current, commands), [registry, commands]);
  useEffect(() => {
    const key = owner.current;
    return () => registry?.set(key, null);
  }, [registry]);
}

/** Opens the list of keys. */
export const useShowKeys = () => useContext(Context)?.showKeys ?? (() => undefined);

const isTyping = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement &&
  (target.isContentEditable || /^(INPUT|TEXTAREA|SELECT)$/.test(target.tagName));

export function CommandsProvider({ children }: { children: ReactNode }) {
  const owners = useRef(new Map<symbol, readonly Command[]>());
  const [listed, setListed] = useState<readonly Command[] | null>(null);
  const all = () => [...owners.current.values()].flat();

  const registry = useMemo<Registry>(
    () => ({
      set(owner, commands) {
        if (commands) owners.current.set(owner, commands);
        else owners.current.delete(owner);
      },
      showKeys: () => setListed(all()),
    }),
    [],
  );

  useEffect(() => {
    if (Platform.OS !== 'web') return;
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || isTyping(event.target) || document.querySelector('[aria-modal="true"]'))
        return;
      if (event.key === '?') {
        event.preventDefault();
        registry.showKeys();
        return;
      }
      const command = commandFor(all(), event);
      if (!command) return;
      event.preventDefault();
      command.perform();
    };
    document.addEventListener('keydown', onKeyDown);
    return () => document.removeEventListener('keydown', onKeyDown);
  }, [registry]);

  return (
    <Context.Provider value={registry}>
      {children}
      {listed && <KeysDialog commands={listed} onClose={() => setListed(null)} />}
    </Context.Provider>
  );
}
