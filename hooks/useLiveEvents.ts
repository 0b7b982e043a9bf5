import { useEffect, useSyncExternalStore } from 'react';
import { useSWRConfig } from 'swr';
import type { LiveEvent } from '@/shared/contract/events';
import { API } from './api';
import {
  isProgressOnly,
  listWithProgress,
  placesOf,
  staleAfter,
  withProgress,
  type Running,
} from './liveEvents';
import type { List } from './useRead';

const listeners = new Set<(event: LiveEvent) => void>();
/** For a screen that wants the events themselves; returns what ends it. */
export function onLiveEvent(listener: (event: LiveEvent) => void): () => void {
  listeners.add(listener);
  return () => void listeners.delete(listener);
}

let connected = true;
const connectionListeners = new Set<() => void>();
function setConnected(next: boolean) {
  if (connected === next) return;
  connected = next;
  for (const listener of connectionListeners) listener();
}
/** false while the line to the server is down. */
export const useConnected = (): boolean =>
  useSyncExternalStore(
    (listener) => {
      connectionListeners.add(listener);
      return () => void connectionListeners.delete(listener);
    },
    () => connected,
  );

/** Keeps what is shown true: one stream of events for the whole app, opened while somebody is signed in. */
export function useLiveEvents(active: boolean) {
  const { mutate, cache } = useSWRConfig();
  useEffect(() => {
    if (!active || typeof EventSource === 'undefined') return;
    const cached = <T>(key: string) => cache.get(key)?.data as T | undefined;
    let wasDown = false;

    const take = (event: LiveEvent) => {
      for (const listener of listeners) listener(event);
      const { record, list } = placesOf(event);
      const shown =
        cached<Running>(record) ??
        (list ? cached<List<Running>>(list)?.items.find((c) => c.id === event.id) : undefined);
      if (!isProgressOnly(event, shown)) {
        void mutate(staleAfter(event));
        return;
      }
      void mutate<Running>(record, (c) => c && withProgress(c, event), { revalidate: false });
      if (list)
        void mutate<List<Running>>(list, (l) => l && listWithProgress(l, event), { revalidate: false });
    };

    let source: EventSource | null = null;
    let timer: ReturnType<typeof setTimeout> | undefined;
    const open = () => {
      source = new EventSource(`${API}/events`);
      source.onopen = () => {
        setConnected(true);
        // what happened while the line was down was not heard
        if (wasDown)
          void mutate((key) => typeof key === 'string' && !/\/(channels|spectrum|header|marks)/.test(key));
        wasDown = false;
      };
      source.onmessage = (message: MessageEvent<string>) => {
        try {
          take(JSON.parse(message.data) as LiveEvent);
        } catch {
          /* a line that is not an event says nothing */
        }
      };
      source.onerror = () => {
        wasDown = true;
        setConnected(false);
        // the browser tries again by itself unless the server refused
        if (source?.readyState === EventSource.CLOSED) timer = setTimeout(open, 5_000);
      };
    };
    open();
    return () => {
      source?.close();
      clearTimeout(timer);
      setConnected(true);
    };
  }, [active, mutate, cache]);
}
