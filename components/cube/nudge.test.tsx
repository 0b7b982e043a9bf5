import fc from 'fast-check';
import { nudged } from '@/components/cube/nudge';

const asImage = {
  fromImage: (at: { x: number; y: number }) => at,
  toImage: (at: { x: number; y: number }) => at,
};

/** Azimuth across from up through left, distance from (30, 30) downward: a polar view of a flat sky. */
const polar = {
  fromImage({ x, y }: { x: number; y: number }) {
    return { x: Math.atan2(-(x - 30), y - 30) * 100, y: -Math.hypot(x - 30, y - 30) * 7 };
  },
  toImage({ x, y }: { x: number; y: number }) {
    return { x: 30 + (y / 7) * Math.sin(x / 100), y: 30 - (y / 7) * Math.cos(x / 100) };
  },
};
const place = fc.record({
  x: fc.double({ min: 0, max: 60, noNaN: true }),
  y: fc.double({ min: 0, max: 60, noNaN: true }),
});

test('on the image itself a nudge goes along its pixels', () => {
  const at = nudged({ x: 4, y: 9 }, [1, 0], 0.3, asImage);
  expect([at.x, at.y]).toEqual([expect.closeTo(4.3, 9), 9]);
  expect(nudged({ x: 4, y: 9 }, [0, -1], 3, asImage)).toEqual({ x: 4, y: expect.closeTo(6, 9) });
});

test('in a polar view up leads to the centre, right keeps the distance; the step is as long as on the image', () => {
  fc.assert(
    fc.property(place, (mark) => {
      const r = Math.hypot(mark.x - 30, mark.y - 30);
      fc.pre(r > 1);
      const inward = nudged(mark, [0, 1], 0.3, polar);
      expect(Math.hypot(inward.x - 30, inward.y - 30)).toBeCloseTo(r - 0.3, 6);
      const along = nudged(mark, [1, 0], 0.01, polar);
      expect(Math.hypot(along.x - 30, along.y - 30)).toBeCloseTo(r, 3);
      expect(Math.hypot(along.x - mark.x, along.y - mark.y)).toBeCloseTo(0.01, 6);
    }),
  );
});

test('where the picture does not show the mark, it stays', () => {
  const mark = { x: 1, y: 2 };
  expect(nudged(mark, [1, 0], 1, { ...asImage, fromImage: () => null })).toBe(mark);
  expect(nudged(mark, [1, 0], 1, { ...asImage, toImage: () => null })).toBe(mark);
});
