import {
  nextToStart,
  rateOf,
  timeLeft,
  uploadsReducer,
  waitAfter,
  type UploadEvent,
  type UploadItem,
} from './uploadsState';

const run = (...events: UploadEvent[]): readonly UploadItem[] =>
  events.reduce(uploadsReducer, [] as readonly UploadItem[]);
const added: UploadEvent = {
  type: 'added',
  items: ['a', 'b', 'c'].map((id) => ({ id, regionId: 'r', fileName: `${id}.fits`, size: 1000 })),
};
const item = (items: readonly UploadItem[], id: string) => items.find((i) => i.id === id)!;

test('two files go at once, the third waits for its turn', () => {
  let items = run(added);
  expect(nextToStart(items).map((i) => i.id)).toEqual(['a', 'b']);
  items = [{ type: 'started', id: 'a' } as const, { type: 'started', id: 'b' } as const].reduce(
    uploadsReducer,
    items,
  );
  expect(nextToStart(items)).toEqual([]);
  expect(nextToStart(uploadsReducer(items, { type: 'done', id: 'a', cubeId: 'x' })).map((i) => i.id)).toEqual(
    ['c'],
  );
  expect(nextToStart(uploadsReducer(items, { type: 'paused', id: 'b' })).map((i) => i.id)).toEqual(['c']);
});

test('rate and time left come from the last seconds alone', () => {
  const items = run(
    added,
    { type: 'started', id: 'a' },
    { type: 'progressed', id: 'a', sent: 0, at: 0 },
    { type: 'progressed', id: 'a', sent: 100, at: 10_000 },
    { type: 'progressed', id: 'a', sent: 300, at: 12_000 },
  );
  expect(rateOf(item(items, 'a'))).toBe(100);
  expect(timeLeft(item(items, 'a'))).toBe(7);
  expect(rateOf(item(items, 'b'))).toBeNull();
});

test('a paused file does not go on because a stopped request reports late', () => {
  const items = run(added, { type: 'started', id: 'a' }, { type: 'paused', id: 'a' });
  const late = [
    { type: 'progressed', id: 'a', sent: 500, at: 1 },
    { type: 'lost', id: 'a' },
  ] as const;
  expect(item(late.reduce(uploadsReducer, items), 'a')).toMatchObject({ status: 'paused', sent: 0 });
});

test('a refusal is final and keeps its cause', () => {
  const problem = {
    type: '/problems/fits-card',
    title: 'A header card cannot be used',
    status: 422,
    detail: 'x',
    card: 'CTYPE3',
  };
  const items = run(
    added,
    { type: 'started', id: 'a' },
    { type: 'refused', id: 'a', problem },
    { type: 'queued', id: 'a' },
  );
  expect(item(items, 'a')).toMatchObject({ status: 'refused', problem });
});

test('the wait grows with each loss and is forgotten once bytes arrive', () => {
  expect([1, 2, 3, 9].map(waitAfter)).toEqual([1000, 2000, 4000, 15_000]);
  const lost = run(added, { type: 'started', id: 'a' }, { type: 'lost', id: 'a' }, { type: 'lost', id: 'a' });
  expect(item(lost, 'a').losses).toBe(2);
  const again = [
    { type: 'started', id: 'a' } as const,
    { type: 'progressed', id: 'a', sent: 10, at: 5 } as const,
  ];
  expect(item(again.reduce(uploadsReducer, lost), 'a').losses).toBe(0);
});
