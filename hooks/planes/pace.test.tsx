import { pace, type Pace } from '@/hooks/planes/pace';

const steps = (from: number, channels: readonly number[], everyMs: number): Pace => {
  let at = 0;
  let now: Pace | null = null;
  let before = from;
  for (const channel of channels) {
    now = pace(now, before, channel, at);
    before = channel;
    at += everyMs;
  }
  return now!;
};

test('a hand that passes by asks ahead of itself, the farther the faster', () => {
  const slow = steps(10, [11, 12, 13, 14], 400);
  expect([slow.fast, slow.way]).toEqual([false, 1]);
  const quick = steps(40, [39, 38, 37, 36, 35], 50);
  expect([quick.fast, quick.way, quick.ahead]).toEqual([true, -1, 10]);
  const film = steps(0, [1, 2, 3, 4, 5], 1000 / 60);
  expect(film.ahead).toBeGreaterThan(25);
  expect(film.ahead).toBeLessThanOrEqual(40);
});

test('turning round and pausing begin anew', () => {
  const quick = steps(0, [1, 2, 3, 4], 50);
  expect(pace(quick, 4, 3, quick.at + 50)).toMatchObject({ way: -1, rate: 0, fast: false, ahead: 0 });
  expect(pace(quick, 4, 5, quick.at + 2000)).toMatchObject({ way: 1, rate: 0, fast: false });
});
