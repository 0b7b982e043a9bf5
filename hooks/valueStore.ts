import { useCallback, useSyncExternalStore } from 'react';

/** A value outside React: what changes with every pointer move is drawn from here and renders only who looks at it. */
export interface ValueStore<T> {
  get(): T;
  set(value: T): void;
  subscribe(listener: () => void): () => void;
}

export function valueStore<T>(initial: T): ValueStore<T> {
  let value = initial;
  const listeners = new Set<() => void>();
  return {
    get: () => value,
    set(next) {
      if (Object.is(next, value)) return;
      value = next;
      for (const listener of [...listeners]) listener();
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}

/** Render with a part of the value, and again only when that part changes. */
export function useValue<T, Part>(store: ValueStore<T>, part: (value: T) => Part): Part {
  const read = useCallback(() => part(store.get()), [store, part]);
  return useSyncExternalStore(store.subscribe, read, read);
}
