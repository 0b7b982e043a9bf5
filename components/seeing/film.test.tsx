import { nextFrame } from '@/components/seeing/useFilm';

test('a film runs to its end, turns, and comes back', () => {
  let at: { position: number; way: 1 | -1 } = { position: 3, way: 1 };
  const seen = Array.from({ length: 9 }, () => (at = nextFrame(at.position, at.way, 2, 5)).position);
  expect(seen).toEqual([4, 5, 4, 3, 2, 3, 4, 5, 4]);
});

test('from outside it begins at its beginning; without a span it stands', () => {
  expect(nextFrame(9, -1, 2, 5)).toEqual({ position: 2, way: 1 });
  expect(nextFrame(4, 1, 4, 4).position).toBe(4);
});
