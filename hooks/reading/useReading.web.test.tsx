import { act, renderHook, waitFor } from '@testing-library/react';
import type { ReactNode } from 'react';
import { SWRConfig } from 'swr';
import { draftKey, readDraft } from '@/hooks/reading/readingDraft';
import { useReading } from '@/hooks/reading/useReading';
import type { Reading } from '@/shared/contract/readings';

/** A server that keeps one reading by revision, and can be cut off. */
function server(first: Partial<Reading> = {}) {
  const state = {
    stored: {
      id: 'r1',
      shellId: 's1',
      cubeId: 'c1',
      marks: [],
      revision: 2,
      updatedAt: null,
      ...first,
    } as Reading,
    cut: false,
    puts: [] as { marks: unknown[]; revision: number }[],
  };
  const answer = (status: number, body: unknown) =>
    ({
      ok: status < 300,
      status,
      json: async () => body,
      text: async () => JSON.stringify(body),
    }) as Response;
  globalThis.fetch = (async (_url: string, init: RequestInit) => {
    if (state.cut) throw new TypeError('Failed to fetch');
    if (init.method !== 'PUT') return answer(200, state.stored);
    const draft = JSON.parse(String(init.body));
    state.puts.push(draft);
    if (draft.revision !== state.stored.revision)
      return answer(409, {
        type: '/problems/stale-revision',
        title: 'newer',
        status: 409,
        detail: '',
        stored: state.stored,
        yours: draft,
      });
    state.stored = { ...state.stored, marks: draft.marks, revision: draft.revision + 1 };
    return answer(200, state.stored);
  }) as typeof fetch;
  return state;
}

const wrapper = ({ children }: { children: ReactNode }) => (
  <SWRConfig value={{ provider: () => new Map(), dedupingInterval: 0, revalidateOnFocus: false }}>
    {children}
  </SWRConfig>
);
const open = () =>
  renderHook(({ shell }) => useReading(shell, 'c1', 'p1'), { wrapper, initialProps: { shell: 's1' } });
const mark = (id: string) => ({ id, channel: 1, x: 2, y: 3 });

beforeAll(() => {
  AbortSignal.timeout = () => new AbortController().signal; // its timer would outlive the test
});
beforeEach(() => localStorage.clear());

async function ready(result: { current: ReturnType<typeof useReading> }) {
  await waitFor(() => expect(result.current.state.ready).toBe(true));
}

test('a row of taps is one save, and the draft goes once it is safe', async () => {
  const srv = server();
  const { result } = open();
  await ready(result);
  act(() => result.current.dispatch({ type: 'add', marks: [mark('a')] }));
  act(() => result.current.dispatch({ type: 'add', marks: [mark('b')] }));
  expect(result.current.status.kind).toBe('saving');
  await waitFor(() => expect(readDraft(draftKey('p1', 's1'))?.marks).toHaveLength(2));
  await waitFor(() => expect(result.current.status.kind).toBe('saved'), { timeout: 3000 });
  expect(srv.puts).toHaveLength(1);
  expect(srv.stored.revision).toBe(3);
  expect(readDraft(draftKey('p1', 's1'))).toBeNull();
});

test('with the line down marks wait here, survive a reload, and go out when it is back', async () => {
  const srv = server();
  const first = open();
  await ready(first.result);
  srv.cut = true;
  act(() => first.result.current.dispatch({ type: 'add', marks: [mark('a')] }));
  await waitFor(() => expect(first.result.current.status).toEqual({ kind: 'offline', waiting: 1 }), {
    timeout: 3000,
  });
  first.unmount();
  srv.cut = false;
  const again = open();
  await ready(again.result);
  expect(again.result.current.state.marks.map((m) => m.id)).toEqual(['a']);
  await waitFor(() => expect(again.result.current.status.kind).toBe('saved'), { timeout: 3000 });
  expect(srv.stored.marks).toEqual([mark('a')]);
});

test('a newer version elsewhere shows both sides; keeping both saves the union', async () => {
  const srv = server();
  const { result } = open();
  await ready(result);
  srv.stored = { ...srv.stored, marks: [mark('z')], revision: 9 };
  act(() => result.current.dispatch({ type: 'add', marks: [mark('a')] }));
  await waitFor(() => expect(result.current.status.kind).toBe('conflict'), { timeout: 3000 });
  expect(result.current.state.conflict?.marks).toHaveLength(1);
  act(() => result.current.dispatch({ type: 'resolve', keep: 'both' }));
  await waitFor(() => expect(result.current.status.kind).toBe('saved'), { timeout: 3000 });
  expect(srv.stored.marks.map((m) => m.id).sort()).toEqual(['a', 'z']);
  expect(srv.stored.revision).toBe(10);
});

test('flush saves at once and names the reading; with nothing to save it answers directly', async () => {
  const srv = server();
  const { result } = open();
  await ready(result);
  act(() => result.current.dispatch({ type: 'add', marks: [mark('a')] }));
  let id: string | null = null;
  await act(async () => {
    id = await result.current.flush();
  });
  expect(id).toBe('r1');
  expect(srv.puts).toHaveLength(1);
  await act(async () => {
    expect(await result.current.flush()).toBe('r1');
  });
  expect(srv.puts).toHaveLength(1);
});

test('turning to another shell never saves one shell’s marks under the other', async () => {
  const srv = server();
  const view = open();
  await ready(view.result);
  act(() => view.result.current.dispatch({ type: 'add', marks: [mark('a')] }));
  const before = srv.stored;
  srv.stored = { ...srv.stored, shellId: 's2', id: 'r2', marks: [], revision: 0 };
  view.rerender({ shell: 's2' });
  await waitFor(() => expect(view.result.current.state.shellId).toBe('s2'));
  expect(view.result.current.state.marks).toEqual([]);
  expect(srv.puts.every((p) => p.revision !== 0)).toBe(true);
  expect(before.marks).toEqual([]);
});
