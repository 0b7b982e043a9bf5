import { furnitureOf } from '@/components/map/furniture';
import type { Viewport } from '@/shared/image/viewport';

const v: Viewport = { nx: 100, ny: 100, width: 500, height: 500, x: 49.5, y: 49.5, scale: 5 };
/** Pixels of 0.1 degrees about (30, 0), turned by an angle: longitude to the left when not. */
const sky = (turn: number) => {
  const [c, s] = [Math.cos(turn), Math.sin(turn)];
  return {
    project: ({ lon, lat }: { lon: number; lat: number }) => {
      const [e, n] = [-(lon - 30) / 0.1, lat / 0.1];
      return { x: 49.5 + c * e - s * n, y: 49.5 + s * e + c * n };
    },
    unproject: (x: number, y: number) => {
      const [dx, dy] = [x - 49.5, y - 49.5];
      return { lon: 30 - 0.1 * (c * dx + s * dy), lat: 0.1 * (c * dy - s * dx) };
    },
  };
};

test.each([0, 0.6, 2.5])('bar and arrows go with the sky, turned by %d', (turn) => {
  const { bar, arrows } = furnitureOf(v, sky(turn), 1000);
  // 140 screen pixels are 2.8 degrees: the next round one is 2
  expect(bar!.label).toBe('2° · 34.9 pc');
  expect(bar!.px).toBeCloseTo(100, 1);
  expect(arrows!.north.dx).toBeCloseTo(-Math.sin(turn), 3);
  expect(arrows!.north.dy).toBeCloseTo(-Math.cos(turn), 3);
  expect(arrows!.east.dx).toBeCloseTo(-Math.cos(turn), 3);
});

test('off the sky there is neither', () => {
  expect(furnitureOf(v, { ...sky(0), unproject: () => null }, null)).toEqual({ bar: null, arrows: null });
});
