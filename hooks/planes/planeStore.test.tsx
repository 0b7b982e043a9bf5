import { brightnessAt, decodePlane, type ChannelPlane } from '@/hooks/planes/decodePlane';
import { planeStore, type PlaneSize } from '@/hooks/planes/planeStore';

const plane = (channel: number, side: number): ChannelPlane => ({
  channel,
  values: new Uint16Array(side * side),
  width: side,
  height: side,
  block: 1,
  scale: 1,
  offset: 0,
  blank: 65535,
});

/** A server whose answers are given by hand. */
function server(side: number, budgetBytes = 1e9, channels = 40) {
  const asked: {
    channel: number;
    size: PlaneSize;
    answer: (ok?: boolean) => Promise<void>;
    signal: AbortSignal;
  }[] = [];
  const store = planeStore({
    side,
    channels,
    budgetBytes,
    load: (channel, size, signal) =>
      new Promise((resolve, reject) =>
        asked.push({
          channel,
          size,
          signal,
          answer: async (ok = true) => {
            if (ok) resolve(plane(channel, size ?? side));
            else reject(new Error('gone'));
            await new Promise((r) => setTimeout(r, 0));
          },
        }),
      ),
  });
  const names = () => asked.map(({ channel, size }) => `${channel}/${size ?? 'whole'}`);
  return { store, asked, names };
}

test('small before large, then neighbours on both sides', async () => {
  const { store, asked, names } = server(512);
  store.want(10, 900);
  expect(names()).toEqual(['10/256']); // nothing competes with the first look
  await asked[0]!.answer();
  expect(store.best(10)!.width).toBe(256);
  expect(names().slice(1)).toEqual(['10/whole', '11/whole', '9/whole', '12/whole']);
  await asked[1]!.answer();
  expect(store.best(10)!.width).toBe(512);
  expect(names().slice(5)).toEqual(['8/whole']);
});

test('a small cube comes whole at once, a large one no finer than the screen can show', async () => {
  const small = server(200);
  small.store.want(0, 800);
  expect(small.names()[0]).toBe('0/whole');
  const large = server(4096);
  large.store.want(5, 700);
  await large.asked[0]!.answer();
  expect(large.names().slice(0, 3)).toEqual(['5/256', '5/1024', '6/1024']);
  large.store.want(5, 5000);
  expect(large.names()).toContain('5/whole');
});

test('what is no longer wanted is given up, and a late answer changes nothing', async () => {
  const { store, asked } = server(512);
  store.want(10, 900);
  store.want(30, 900);
  expect(asked[0]!.signal.aborted).toBe(true);
  await asked[0]!.answer();
  expect(store.best(10)).toBeNull();
  expect(asked[1]!.channel).toBe(30);
});

test('a step to a neighbour that is there asks for nothing twice', async () => {
  const { store, asked, names } = server(200);
  store.want(10, 100);
  for (let i = 0; i < asked.length; i++) await asked[i]!.answer();
  const before = names().length;
  store.want(11, 100);
  expect(store.best(11)!.channel).toBe(11);
  expect(new Set(names()).size).toBe(names().length);
  expect(names().length).toBeGreaterThanOrEqual(before);
});

test('what was looked at longest ago goes first', async () => {
  const { store, asked } = server(100, 3 * 2 * 100 * 100, 100);
  store.want(0, 100);
  await asked[0]!.answer(); // 0
  await asked[1]!.answer(); // 1
  store.best(0);
  await asked[2]!.answer(); // 2
  await asked[3]!.answer(); // 3: one too many
  expect([store.best(1), store.best(0)?.channel]).toEqual([null, 0]);
});

test('a failure is kept with its channel and tried again when asked to', async () => {
  const { store, asked, names } = server(200);
  const heard = jest.fn();
  store.subscribe(heard);
  store.want(3, 100);
  await asked[0]!.answer(false);
  expect(String(store.problem(3))).toContain('gone');
  expect(store.problem(4)).toBeNull();
  expect(heard).toHaveBeenCalled();
  const before = names().length;
  store.retry();
  expect(store.problem(3)).toBeNull();
  store.want(4, 100);
  expect(names().length).toBeGreaterThanOrEqual(before);
});

describe('decoding', () => {
  const header = (more: Record<string, string> = {}) => {
    const all: Record<string, string> = {
      'Plane-Width': '2',
      'Plane-Height': '2',
      'Plane-Block': '3',
      'Plane-Scale': '0.5',
      'Plane-Offset': '-1',
      'Plane-Blank': '65535',
      ...more,
    };
    return (name: string) => all[name] ?? null;
  };
  const body = Uint16Array.from([0, 2, 65535, 4]).buffer;
  test('numbers come back with their scale, and image pixels find their block', () => {
    const p = decodePlane(7, body, header());
    expect([brightnessAt(p, 0, 0), brightnessAt(p, 5, 2), brightnessAt(p, 3, 3)]).toEqual([-1, 0, 1]);
    expect(brightnessAt(p, 0, 4)).toBeNaN();
    expect(brightnessAt(p, 6, 0)).toBeNaN();
  });
  test('a body of the wrong length, or without scale, is refused', () => {
    expect(() => decodePlane(7, body, header({ 'Plane-Width': '3' }))).toThrow('8 bytes, not 3 × 2 × 2');
    expect(() => decodePlane(7, body, header({ 'Plane-Scale': '' }))).toThrow('without Plane-Scale');
  });
});
