import type { PlacedMark } from '@/hooks/reading/placedMark';
import {
  EMPTY_READING,
  isDirty,
  readingReducer,
  saveStatus,
  shouldSend,
  type ReadingAction,
  type ReadingState,
} from '@/hooks/reading/readingState';
import type { Reading } from '@/shared/contract/readings';

const mark = (id: string, x = 1, y = 2, channel = 5): PlacedMark => ({ id, channel, x, y });
const stored = (revision: number, ...marks: PlacedMark[]): Reading => ({
  id: 'r',
  shellId: 's',
  cubeId: 'c',
  marks,
  revision,
  updatedAt: null,
});
const run = (state: ReadingState, ...actions: ReadingAction[]) => actions.reduce(readingReducer, state);
const ready = (...marks: PlacedMark[]) =>
  run(EMPTY_READING, { type: 'loaded', reading: stored(3, ...marks), draft: null });
const ids = (state: ReadingState) => state.marks.map((m) => m.id).join('');
const add = (id: string, x?: number): ReadingAction => ({ type: 'add', marks: [mark(id, x)] });

describe('undo and redo', () => {
  test('take back and bring back own steps, in place', () => {
    let s = run(ready(mark('a'), mark('b')), add('c'), { type: 'remove', ids: ['a'] });
    expect(ids(s)).toBe('bc');
    s = run(s, { type: 'undo' });
    expect(ids(s)).toBe('abc');
    s = run(s, { type: 'undo' }, { type: 'undo' });
    expect(ids(s)).toBe('ab'); // what was there before stays
    s = run(s, { type: 'redo' }, { type: 'redo' }, { type: 'redo' });
    expect(ids(s)).toBe('bc');
    expect(run(s, { type: 'undo' }, add('d')).redo).toEqual([]);
  });

  test('a drag is one step', () => {
    const to = (x: number): ReadingAction => ({
      type: 'move',
      to: [{ id: 'a', x, y: 2 }],
      gesture: 'drag 1',
    });
    let s = run(ready(mark('a')), to(2), to(3), to(4));
    expect(s.undo).toHaveLength(1);
    s = run(s, { type: 'undo' });
    expect(s.marks[0]).toEqual(mark('a', 1));
    expect(run(s, { type: 'redo' }).marks[0]).toEqual(mark('a', 4));
    const again = run(
      s,
      { type: 'redo' },
      { type: 'move', to: [{ id: 'a', x: 9, y: 2 }], gesture: 'drag 1' },
    );
    expect(again.undo).toHaveLength(2);
  });

  test('nothing changes without a change', () => {
    const s = ready(mark('a'));
    expect(run(s, { type: 'move', to: [{ id: 'a', x: 1, y: 2 }], gesture: null })).toBe(s);
    expect(run(s, { type: 'remove', ids: ['z'] })).toBe(s);
    expect(run(s, { type: 'undo' })).toBe(s);
    expect(run(s, add('a'))).toBe(s);
  });
});

describe('saving', () => {
  test('edits made while a save is on its way stay to be saved', () => {
    let s = run(ready(), add('a'));
    expect([shouldSend(s), saveStatus(s).kind]).toEqual([true, 'saving']);
    s = run(s, { type: 'sending' });
    expect(shouldSend(s)).toBe(false);
    s = run(s, add('b'), { type: 'sent', reading: stored(4, mark('a')) });
    expect([s.revision, isDirty(s), shouldSend(s), ids(s)]).toEqual([4, true, true, 'ab']);
    s = run(s, { type: 'sending' }, { type: 'sent', reading: stored(5, mark('a'), mark('b')) });
    expect([s.revision, saveStatus(s).kind]).toEqual([5, 'saved']);
  });

  test('a lost connection counts what waits and goes on', () => {
    let s = run(ready(), add('a'), { type: 'sending' }, { type: 'lost' }, add('b'));
    expect(saveStatus(s)).toEqual({ kind: 'offline', waiting: 2 });
    expect(shouldSend(s)).toBe(true);
    s = run(s, { type: 'sending' }, { type: 'sent', reading: stored(4) });
    expect(saveStatus(s).kind).toBe('saved');
  });

  test('a save whose answer was lost is recognised by its marks, not taken for someone else', () => {
    const lost = run(ready(), add('a'), { type: 'sending' }, { type: 'lost' });
    const same = run(lost, { type: 'sending' }, { type: 'conflicted', stored: stored(4, mark('a')) });
    expect([same.conflict, same.revision, saveStatus(same).kind]).toEqual([null, 4, 'saved']);
    const more = run(
      lost,
      add('b'),
      { type: 'sending' },
      { type: 'conflicted', stored: stored(4, mark('a')) },
    );
    expect([more.conflict, more.revision, shouldSend(more), ids(more)]).toEqual([null, 4, true, 'ab']);
  });

  test('a refusal keeps the marks and waits for a person', () => {
    const problem = { type: '/problems/x', title: 'No', status: 403, detail: 'no' };
    const s = run(ready(), add('a'), { type: 'sending' }, { type: 'refused', problem });
    expect([saveStatus(s), shouldSend(s), ids(s)]).toEqual([{ kind: 'refused', problem }, false, 'a']);
    expect(shouldSend(run(s, { type: 'retry' }))).toBe(true);
  });
});

describe('two sides', () => {
  const conflicted = run(
    ready(mark('a')),
    { type: 'move', to: [{ id: 'a', x: 8, y: 2 }], gesture: null },
    add('b'),
    { type: 'sending' },
    { type: 'conflicted', stored: stored(7, mark('a', 1), mark('t')) },
  );

  test('nothing is sent until a person has chosen', () => {
    expect([saveStatus(conflicted).kind, shouldSend(conflicted), ids(conflicted)]).toEqual([
      'conflict',
      false,
      'ab',
    ]);
  });

  test('mine: sent again on top of the newer revision', () => {
    const s = run(conflicted, { type: 'resolve', keep: 'mine' });
    expect([ids(s), s.revision, shouldSend(s)]).toEqual(['ab', 7, true]);
  });

  test('stored: taken over, nothing to save, and undo brings mine back', () => {
    const s = run(conflicted, { type: 'resolve', keep: 'stored' });
    expect([ids(s), s.marks[0]!.x, s.revision, saveStatus(s).kind]).toEqual(['at', 1, 7, 'saved']);
    const back = run(s, { type: 'undo' });
    expect([[...ids(back)].sort().join(''), shouldSend(back)]).toEqual(['ab', true]);
  });

  test('both: every mark of either side, mine where both have it', () => {
    const s = run(conflicted, { type: 'resolve', keep: 'both' });
    expect([ids(s), s.marks[0]!.x, shouldSend(s)]).toEqual(['abt', 8, true]);
  });
});

describe('coming back', () => {
  const draft = { marks: [mark('a'), mark('n')], revision: 3 };
  test('a draft on the stored revision goes on as unsaved marks', () => {
    const s = run(EMPTY_READING, { type: 'loaded', reading: stored(3, mark('a')), draft });
    expect([ids(s), shouldSend(s), s.conflict]).toEqual(['an', true, null]);
  });
  test('a draft on an older revision is a conflict, with nothing lost', () => {
    const s = run(EMPTY_READING, { type: 'loaded', reading: stored(9, mark('z')), draft });
    expect([ids(s), s.conflict?.revision]).toEqual(['an', 9]);
    expect(shouldSend(run(s, { type: 'resolve', keep: 'mine' }))).toBe(true);
  });
  test('a draft kept while its save was on the way goes on from that save', () => {
    const left = { ...draft, sent: [mark('a')] };
    const s = run(EMPTY_READING, { type: 'loaded', reading: stored(4, mark('a')), draft: left });
    expect([ids(s), s.revision, s.conflict, shouldSend(s)]).toEqual(['an', 4, null, true]);
  });
  test('a draft that did reach the server is no news', () => {
    const s = run(EMPTY_READING, { type: 'loaded', reading: stored(4, ...draft.marks), draft });
    expect([saveStatus(s).kind, s.revision]).toEqual(['saved', 4]);
  });
  test('news from another window is taken over only when nothing here would be lost', () => {
    const news: ReadingAction = { type: 'arrived', reading: stored(8, mark('w')) };
    expect(ids(run(ready(mark('a')), news))).toBe('w');
    expect(ids(run(ready(mark('a')), add('b'), news))).toBe('ab');
    expect(run(ready(mark('a')), { type: 'arrived', reading: stored(2, mark('w')) }).revision).toBe(3);
  });
  test('marks without an identity take one, and keep it', () => {
    const bare = {
      ...stored(1),
      marks: [
        { channel: 1, x: 2, y: 3 },
        { channel: 1, x: 2, y: 3 },
      ],
    };
    const s = run(EMPTY_READING, { type: 'loaded', reading: bare, draft: null });
    expect(new Set(s.marks.map((m) => m.id)).size).toBe(2);
    expect(run(EMPTY_READING, { type: 'loaded', reading: bare, draft: null }).marks).toEqual(s.marks);
  });
});
