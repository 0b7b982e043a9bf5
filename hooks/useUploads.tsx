import {
  createContext,
  useCallback,
  useContext,
  useEffect,
  useMemo,
  useReducer,
  useRef,
  type ReactNode,
} from 'react';
import { useSWRConfig } from 'swr';
import type { Upload } from 'tus-js-client';
import { api, asProblem } from './api';
import { keys } from './keys';
import { makeSender } from './uploads/sender';
import {
  nextToStart,
  uploadsReducer,
  waitAfter,
  type UploadEvent,
  type UploadItem,
} from './uploads/uploadsState';

export interface Uploads {
  items: readonly UploadItem[];
  /** Puts files in the queue; `uploadId` goes on with an upload the server knows. */
  add: (regionId: string, files: readonly File[], uploadId?: string) => void;
  pause: (id: string) => void;
  resume: (id: string) => void;
  /** Stops a file and lets the server forget what it has of it. */
  cancel: (id: string) => void;
  /** Takes a refused or finished file off the list. */
  dismiss: (id: string) => void;
  /** Lets the server forget an upload that this page does not hold. */
  forget: (regionId: string, uploadId: string) => Promise<void>;
}
const Context = createContext<Uploads | null>(null);

export function useUploads(): Uploads {
  const uploads = useContext(Context);
  if (!uploads) throw new Error('useUploads needs an UploadsProvider above it.');
  return uploads;
}

/** Holds the queue above the router, so that uploads go on from screen to screen. */
export function UploadsProvider({ children }: { children: ReactNode }) {
  const [items, dispatch] = useReducer(uploadsReducer, []);
  const files = useRef(new Map<string, { file: File; uploadId?: string }>());
  const senders = useRef(new Map<string, Upload>());
  const current = useRef(items);
  useEffect(() => {
    current.current = items;
  }, [items]);
  const { mutate } = useSWRConfig();

  const refresh = useCallback(
    (regionId: string) => {
      for (const key of [keys.uploads(regionId), keys.cubes(regionId), keys.region(regionId), keys.regions()])
        void mutate(key);
    },
    [mutate],
  );

  const start = useCallback(
    async (item: UploadItem) => {
      const held = files.current.get(item.id);
      if (!held) return;
      dispatch({ type: 'started', id: item.id });
      try {
        let sender = senders.current.get(item.id);
        if (!sender) {
          sender = await makeSender(held.file, item.regionId, listen(item, dispatch, refresh), held.uploadId);
          if (!files.current.has(item.id)) return; // cancelled meanwhile
          senders.current.set(item.id, sender);
        }
        if (current.current.find((i) => i.id === item.id)?.status !== 'paused') sender.start();
      } catch (error) {
        dispatch({ type: 'refused', id: item.id, problem: asProblem(error).body });
      }
    },
    [refresh],
  );

  useEffect(() => {
    for (const item of nextToStart(items)) void start(item);
  }, [items, start]);

  // a lost line: again when the browser says it is back, and every few seconds in any case
  useEffect(() => {
    const lost = items.filter((item) => item.status === 'lost');
    if (lost.length === 0) return;
    const again = () => lost.forEach((item) => void start(item));
    const timer = setTimeout(again, waitAfter(Math.min(...lost.map((item) => item.losses))));
    globalThis.addEventListener?.('online', again);
    return () => {
      clearTimeout(timer);
      globalThis.removeEventListener?.('online', again);
    };
  }, [items, start]);

  const busy = items.some((item) => ['queued', 'sending', 'lost', 'paused'].includes(item.status));
  useEffect(() => {
    if (!busy) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    globalThis.addEventListener?.('beforeunload', ask);
    return () => globalThis.removeEventListener?.('beforeunload', ask);
  }, [busy]);

  const drop = useCallback((id: string) => {
    files.current.delete(id);
    senders.current.delete(id);
    dispatch({ type: 'removed', id });
  }, []);

  const value = useMemo<Uploads>(
    () => ({
      items,
      add(regionId, added, uploadId) {
        const named = added.map((file) => ({ file, id: crypto.randomUUID() }));
        for (const { id, file } of named) files.current.set(id, { file, uploadId });
        dispatch({
          type: 'added',
          items: named.map(({ id, file }) => ({ id, regionId, fileName: file.name, size: file.size })),
        });
      },
      pause(id) {
        dispatch({ type: 'paused', id });
        void senders.current.get(id)?.abort();
      },
      resume: (id) => dispatch({ type: 'queued', id }),
      cancel(id) {
        const sender = senders.current.get(id);
        const regionId = current.current.find((item) => item.id === id)?.regionId;
        drop(id);
        void sender
          ?.abort(true)
          .catch(() => undefined) // what the server still holds is listed as unfinished, with a button of its own
          .then(() => regionId && refresh(regionId));
      },
      dismiss: drop,
      async forget(regionId, uploadId) {
        await api(`/uploads/${uploadId}`, { method: 'DELETE', headers: { 'Tus-Resumable': '1.0.0' } });
        refresh(regionId);
      },
    }),
    [items, drop, refresh],
  );
  return <Context.Provider value={value}>{children}</Context.Provider>;
}

function listen(
  item: UploadItem,
  dispatch: (event: UploadEvent) => void,
  refresh: (regionId: string) => void,
) {
  const { id, regionId } = item;
  let told = 0;
  return {
    onNamed: (uploadId: string) => dispatch({ type: 'named', id, uploadId }),
    onProgress(sent: number) {
      const at = Date.now();
      if (at - told < 200 && sent < item.size) return; // five times a second is enough for the eye
      told = at;
      dispatch({ type: 'progressed', id, sent, at });
    },
    onLost: () => dispatch({ type: 'lost', id }),
    onRefused(problem: UploadItem['problem'] & object) {
      dispatch({ type: 'refused', id, problem });
      refresh(regionId);
    },
    onDone(cubeId: string | null) {
      dispatch({ type: 'done', id, cubeId });
      refresh(regionId);
    },
  };
}
