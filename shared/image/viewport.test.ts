import fc from 'fast-check';
import {
  clamped,
  fitScale,
  fitted,
  imageRect,
  looking,
  panned,
  pixelAt,
  resized,
  toImage,
  toScreen,
  within,
  zoomOf,
  zoomedAbout,
  type Viewport,
} from '@/shared/image/viewport';

const size = fc.integer({ min: 1, max: 3000 });
const viewport: fc.Arbitrary<Viewport> = fc
  .record({
    nx: size,
    ny: size,
    width: fc.integer({ min: 50, max: 2000 }),
    height: fc.integer({ min: 50, max: 2000 }),
    u: fc.double({ min: -0.2, max: 1.2, noNaN: true }),
    w: fc.double({ min: -0.2, max: 1.2, noNaN: true }),
    zoom: fc.double({ min: 0.3, max: 30, noNaN: true }),
  })
  .map(({ nx, ny, width, height, u, w, zoom }) => ({
    nx,
    ny,
    width,
    height,
    x: u * nx,
    y: w * ny,
    scale: zoom * fitScale({ nx, ny, width, height }),
  }));
const place = fc.record({
  sx: fc.double({ min: 0, max: 1500, noNaN: true }),
  sy: fc.double({ min: 0, max: 1500, noNaN: true }),
});
const near = (a: number, b: number, tolerance = 1e-6) => expect(Math.abs(a - b)).toBeLessThan(tolerance);

test('to the screen and back', () => {
  fc.assert(
    fc.property(viewport, place, (v, at) => {
      const back = toScreen(v, toImage(v, at));
      near(back.sx, at.sx);
      near(back.sy, at.sy);
    }),
  );
});

test('up in the image is up on the screen', () => {
  const v = fitted(10, 10, 100, 100);
  expect(toScreen(v, { x: 0, y: 9 })).toEqual({ sx: 5, sy: 5 });
  expect(toScreen(v, { x: 0, y: 0 })).toEqual({ sx: 5, sy: 95 });
});

test('a fitted image touches two opposite sides of the map with its edges and lies in the middle', () => {
  fc.assert(
    fc.property(size, size, size, size, (nx, ny, width, height) => {
      const r = imageRect(fitted(nx, ny, width, height));
      near(r.left + r.width / 2, width / 2);
      near(r.top + r.height / 2, height / 2);
      near(Math.max(r.width / width, r.height / height), 1);
    }),
  );
});

test('the point under the finger stays there while zooming', () => {
  fc.assert(
    fc.property(viewport, place, fc.double({ min: 0.8, max: 1.25, noNaN: true }), (start, at, factor) => {
      const v = clamped(start);
      const z = zoomedAbout(v, factor, at);
      const free = clamped({ ...z, x: z.x, y: z.y });
      expect(free).toEqual(z); // clamping again changes nothing
      const before = toImage(v, at);
      // Only a map held at its bounds may let the point slip.
      const wished = {
        x: before.x - (at.sx - v.width / 2) / z.scale,
        y: before.y + (at.sy - v.height / 2) / z.scale,
      };
      const held = z.x !== wished.x || z.y !== wished.y;
      const after = toScreen(z, before);
      if (!held) {
        near(after.sx, at.sx, 1e-5);
        near(after.sy, at.sy, 1e-5);
      } else {
        const loose = { ...z, ...wished };
        expect(clamped(loose)).not.toEqual(loose);
      }
    }),
  );
});

test('panning moves what is under the finger with it', () => {
  const v = looking(fitted(500, 500, 400, 400), 250, 250, 5);
  const p = toImage(v, { sx: 100, sy: 100 });
  const moved = toScreen(panned(v, 12, -7), p);
  near(moved.sx, 112);
  near(moved.sy, 93);
});

test('bounds: idempotent, the image always reaches the middle of the map, and a small image rests in it', () => {
  fc.assert(
    fc.property(viewport, (v) => {
      const c = clamped(v);
      const twice = clamped(c);
      near(twice.x, c.x, 1e-9 * v.nx + 1e-9);
      near(twice.y, c.y, 1e-9 * v.ny + 1e-9);
      expect(pixelAt({ nx: v.nx + 2, ny: v.ny + 2 }, { x: c.x + 1, y: c.y + 1 })).not.toBeNull();
      if (zoomOf(c) <= 1) {
        near(c.x, (v.nx - 1) / 2, 1e-6 * v.nx);
        near(c.y, (v.ny - 1) / 2, 1e-6 * v.ny);
      }
    }),
  );
});

test('another size of map keeps place and zoom; an address leads back', () => {
  const v = looking(fitted(512, 512, 600, 600), 200, 300, 3);
  const phone = resized(v, 390, 420);
  expect([phone.x, phone.y, zoomOf(phone)].map((n) => Number(n.toFixed(9)))).toEqual([200, 300, 3]);
  expect(looking(fitted(512, 512, 390, 420), 200, 300, 3)).toEqual(phone);
});

test('pixels reach half a pixel to each side of their centre', () => {
  const v = { nx: 4, ny: 3 };
  expect(pixelAt(v, { x: -0.5, y: 2.49 })).toEqual({ i: 0, j: 2 });
  expect(pixelAt(v, { x: 3.49, y: 0 })).toEqual({ i: 3, j: 0 });
  expect(pixelAt(v, { x: 3.5, y: 0 })).toBeNull();
  expect(pixelAt(v, { x: 0, y: -0.51 })).toBeNull();
  expect(within(v, { x: 9, y: -3 })).toEqual({ x: 3.5, y: -0.5 });
});
