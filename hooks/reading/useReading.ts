import { useCallback, useEffect, useMemo, useReducer, useRef } from 'react';
import { useSWRConfig } from 'swr';
import { api, asProblem, type ApiProblem } from '@/hooks/api';
import { keys } from '@/hooks/keys';
import { draftKey, keepDraft, readDraft } from '@/hooks/reading/readingDraft';
import { historyKey, keepHistory, readHistory } from '@/hooks/reading/readingHistory';
import {
  draftOf,
  EMPTY_READING,
  isDirty,
  readingReducer,
  saveStatus,
  shouldSend,
  type ReadingAction,
  type ReadingState,
  type SaveStatus,
} from '@/hooks/reading/readingState';
import { onLiveEvent } from '@/hooks/useLiveEvents';
import { useRead } from '@/hooks/useRead';
import type { Reading, ReadingDraft } from '@/shared/contract/readings';

/** Marks rest this long before they are sent, so that a row of taps is one save. */
const DEBOUNCE_MS = 250;
/** So many marks are written to the browser's storage within a frame. */
const AT_ONCE = 1000;
/** After a lost connection, unless the browser says earlier that it is back. */
const AGAIN_MS = 4000;
/** A connection that gives no answer for this long is taken for lost. */
const ANSWER_MS = 20000;

export interface ReadingSession {
  state: ReadingState;
  status: SaveStatus;
  /** Why the reading could not be read at all. */
  problem: ApiProblem | null;
  reload: () => void;
  dispatch: (action: ReadingAction) => void;
  /** Send what is unsaved now; answers with the reading's id once everything is saved, else null. */
  flush: () => Promise<string | null>;
}

/**
 * My reading of a shell, with one writer: changes wait for the last answer and go out together, with the revision they
 * build on. Until the server has them they lie in the browser's own store, so a reload loses nothing.
 */
export function useReading(shellId: string | null, cubeId: string, personId: string | null): ReadingSession {
  const [state, dispatch] = useReducer(readingReducer, EMPTY_READING);
  const read = useRead<Reading>(shellId && keys.reading(shellId), { revalidateOnFocus: true });
  const now = useRef(state);
  useEffect(() => {
    now.current = state;
  }, [state]);

  // The first answer begins the session, later ones are news from elsewhere.
  const { mutate } = useSWRConfig();
  const begun = useRef<string | null>(null);
  const { data, reload } = read;
  useEffect(() => {
    if (!data || data.shellId !== shellId) return;
    if (begun.current === shellId) dispatch({ type: 'arrived', reading: data });
    else {
      begun.current = shellId;
      const draft = personId ? readDraft(draftKey(personId, data.shellId)) : null;
      const history = personId ? readHistory(historyKey(personId, data.shellId)) : null;
      dispatch({ type: 'loaded', reading: data, draft, history });
    }
  }, [data, shellId, personId]);
  useEffect(
    () =>
      onLiveEvent((event) => {
        if (event.subject === 'reading' && event.shellId === shellId && !now.current.sending) void reload();
      }),
    [shellId, reload],
  );

  useDraft(personId, state, cubeId);
  useHistory(personId, state);

  const send = useCallback(async (): Promise<void> => {
    const before = now.current;
    if (!shellId || before.shellId !== shellId || !shouldSend(before)) return;
    now.current = readingReducer(before, { type: 'sending' }); // at once: a second call must see it
    dispatch({ type: 'sending' });
    try {
      const reading = await put(shellId, cubeId, before);
      dispatch({ type: 'sent', reading });
      void mutate(keys.reading(shellId), reading, { revalidate: false });
    } catch (error) {
      dispatch(failure(error));
    }
  }, [shellId, cubeId, mutate]);

  const { edits, offline } = state;
  const ready = state.shellId === shellId && shouldSend(state);
  useEffect(() => {
    if (!ready) return;
    const timer = setTimeout(() => void send(), offline ? AGAIN_MS : DEBOUNCE_MS);
    const back = () => void send();
    globalThis.addEventListener?.('online', back);
    return () => {
      clearTimeout(timer);
      globalThis.removeEventListener?.('online', back);
    };
  }, [ready, edits, offline, send]);

  const flush = useCallback(async (): Promise<string | null> => {
    for (let tries = 0; tries < 600; tries++) {
      const s = now.current;
      if (s.shellId !== shellId) return null;
      if (s.ready && !isDirty(s) && !s.sending) return s.readingId;
      if (s.conflict || s.problem || (s.offline && !s.sending && tries > 0)) return null;
      if (s.sending) await new Promise((resolve) => setTimeout(resolve, 50));
      else await send().then(() => new Promise((resolve) => setTimeout(resolve, 0)));
    }
    return null;
  }, [send, shellId]);

  const shown = state.shellId === shellId ? state : EMPTY_READING;
  return useMemo(
    () => ({
      state: shown,
      status: saveStatus(shown),
      problem: shown.ready ? null : read.problem,
      reload: () => void reload(),
      dispatch,
      flush,
    }),
    [shown, read.problem, reload, flush],
  );
}

/** What a save that did not succeed means: the newer version, a refusal, or a line that was lost. */
function failure(error: unknown): ReadingAction {
  if (error instanceof Error && (error.name === 'TimeoutError' || error.name === 'AbortError'))
    return { type: 'lost' };
  const { body, status, type } = asProblem(error);
  const stored = body.stored as Reading | undefined;
  if (status === 409 && type === 'stale-revision' && stored) return { type: 'conflicted', stored };
  // Too many requests and a server at fault are worth another try; other refusals need a person.
  if (status === 0 || status === 429 || status >= 500) return { type: 'lost' };
  return { type: 'refused', problem: body };
}

const put = (shellId: string, cubeId: string, state: ReadingState): Promise<Reading> => {
  const body: ReadingDraft = { cubeId, marks: [...state.marks], revision: state.revision };
  return api<Reading>(keys.reading(shellId), {
    method: 'PUT',
    body,
    signal: AbortSignal.timeout(ANSWER_MS),
  });
};

/** Keep undo and redo in the browser, so that they survive a reload. */
function useHistory(personId: string | null, { ready, shellId, marks, undo, redo }: ReadingState): void {
  const key = personId && shellId && ready ? historyKey(personId, shellId) : null;
  useEffect(() => {
    if (!key) return;
    const keep = () => keepHistory(key, { marks, undo, redo });
    const timer = setTimeout(keep, 150);
    globalThis.addEventListener?.('pagehide', keep);
    return () => {
      clearTimeout(timer);
      globalThis.removeEventListener?.('pagehide', keep);
    };
  }, [key, marks, undo, redo]);
}

/**
 * Keep unsaved marks in the browser: with each change, when the page may go away, and when the person turns
 * to another shell. In the last case they are sent as well; should that fail, they wait here for the next visit.
 */
function useDraft(personId: string | null, state: ReadingState, cubeId: string): void {
  const latest = useRef({ state, cubeId });
  const { ready, shellId } = state;
  const dirty = isDirty(state);
  const key = personId && shellId ? draftKey(personId, shellId) : null;
  useEffect(() => {
    if (!key || !ready) return;
    if (!dirty) {
      keepDraft(key, null);
      return;
    }
    // at once, since a page can end without notice; of very many marks only once they rest
    if (state.marks.length <= AT_ONCE) return void keepDraft(key, draftOf(state));
    const timer = setTimeout(() => keepDraft(key, draftOf(state)), 120);
    return () => clearTimeout(timer);
  }, [key, ready, dirty, state]);
  useEffect(() => {
    if (!key) return;
    const keep = (): boolean => {
      const { state: s } = latest.current;
      return s.ready && isDirty(s) && keepDraft(key, draftOf(s));
    };
    globalThis.addEventListener?.('pagehide', keep);
    globalThis.document?.addEventListener?.('visibilitychange', keep);
    return () => {
      globalThis.removeEventListener?.('pagehide', keep);
      globalThis.document?.removeEventListener?.('visibilitychange', keep);
      const { state: s, cubeId: cube } = latest.current;
      if (!keep() || !s.shellId || s.conflict || s.problem || s.sending) return;
      put(s.shellId, cube, s).then(
        () => keepDraft(key, null),
        () => undefined, // it waits in the browser
      );
    };
  }, [key]);
  // After the effects above, so that what they clean up still sees the shell it was about.
  useEffect(() => {
    latest.current = { state, cubeId };
  });
}
