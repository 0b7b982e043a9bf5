import { historyKey, keepHistory, readHistory } from '@/hooks/reading/readingHistory';
import { EMPTY_READING, readingReducer } from '@/hooks/reading/readingState';
import type { Reading } from '@/shared/contract/readings';

const mark = (id: string, x = 1) => ({ id, channel: 5, x, y: 2 });
const stored = (...marks: ReturnType<typeof mark>[]): Reading => ({
  id: 'r',
  shellId: 's',
  cubeId: 'c',
  marks,
  revision: 3,
  updatedAt: null,
});
const key = historyKey('p', 's');
beforeEach(() => localStorage.clear());

test('undo and redo go on after a reload, from the same marks only', () => {
  let before = readingReducer(EMPTY_READING, { type: 'loaded', reading: stored(mark('a')), draft: null });
  before = readingReducer(before, { type: 'add', marks: [mark('b'), mark('c')] });
  before = readingReducer(before, {
    type: 'describe',
    ids: ['a', 'b'],
    said: { unsure: true },
    gesture: null,
  });
  before = readingReducer(before, { type: 'undo' });
  keepHistory(key, before);

  const reading = stored(mark('a'), mark('b'), mark('c'));
  const again = readingReducer(EMPTY_READING, {
    type: 'loaded',
    reading,
    draft: null,
    history: readHistory(key),
  });
  expect(readingReducer(again, { type: 'redo' }).marks.map((m) => m.unsure)).toEqual([true, true, undefined]);
  expect(readingReducer(again, { type: 'undo' }).marks).toEqual([mark('a')]);

  const other = readingReducer(EMPTY_READING, {
    type: 'loaded',
    reading: stored(mark('a', 7)),
    draft: null,
    history: readHistory(key),
  });
  expect([other.undo, other.redo]).toEqual([[], []]);
});

test('a long history loses its oldest steps, and what cannot be read is none', () => {
  const step = (i: number) => ({
    gesture: null,
    changes: [{ id: `${i}`, before: null, after: { ...mark(`${i}`), note: 'x'.repeat(400) }, index: 0 }],
  });
  keepHistory(key, { marks: [], undo: Array.from({ length: 3000 }, (_, i) => step(i)), redo: [] });
  const kept = readHistory(key)!;
  expect(kept.undo.length).toBeGreaterThan(50);
  expect(kept.undo.at(-1)!.changes[0]!.id).toBe('2999');
  keepHistory(key, { marks: [], undo: [], redo: [] });
  expect(readHistory(key)).toBeNull();
  for (const bad of ['{', '{"marks":[],"undo":[3],"redo":[]}', '{"marks":1}']) {
    localStorage.setItem(key, bad);
    expect(readHistory(key)).toBeNull();
  }
});
