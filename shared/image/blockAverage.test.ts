import fc from 'fast-check';
import { blockAverage, blockFor } from '@/shared/image/blockAverage';

const value = fc.oneof(
  { weight: 6, arbitrary: fc.float({ min: -1000, max: 1000, noNaN: true }) },
  { weight: 1, arbitrary: fc.constantFrom(NaN, Infinity, -Infinity) },
);
const image = fc
  .record({ nx: fc.integer({ min: 1, max: 13 }), ny: fc.integer({ min: 1, max: 11 }) })
  .chain(({ nx, ny }) =>
    fc
      .array(value, { minLength: nx * ny, maxLength: nx * ny })
      .map((v) => ({ nx, ny, plane: Float32Array.from(v) })),
  );

test('averages whole blocks, row by row', () => {
  const plane = Float32Array.from([1, 3, 10, 20, 5, 7, 30, 40]);
  expect(blockAverage(plane, 4, 2, 2)).toEqual({ plane: Float32Array.from([4, 25]), nx: 2, ny: 1 });
});

test('blanks do not count, and a block of blanks is blank', () => {
  const plane = Float32Array.from([1, NaN, NaN, NaN, Infinity, 3, NaN, -Infinity]);
  const { plane: reduced } = blockAverage(plane, 4, 2, 2);
  expect(reduced[0]).toBe(2);
  expect(reduced[1]).toBeNaN();
});

test('edges that a block does not fill average what there is', () => {
  const plane = Float32Array.from([1, 2, 3, 4, 5, 6, 7, 8, 9]);
  expect(blockAverage(plane, 3, 3, 2)).toEqual({ plane: Float32Array.from([3, 4.5, 7.5, 9]), nx: 2, ny: 2 });
});

test('agrees with a plain mean over every block', () => {
  fc.assert(
    fc.property(image, fc.integer({ min: 2, max: 6 }), ({ plane, nx, ny }, block) => {
      const r = blockAverage(plane, nx, ny, block);
      expect([r.nx, r.ny]).toEqual([Math.ceil(nx / block), Math.ceil(ny / block)]);
      for (let j = 0; j < r.ny; j++)
        for (let i = 0; i < r.nx; i++) {
          const inside: number[] = [];
          for (let y = j * block; y < Math.min(ny, (j + 1) * block); y++)
            for (let x = i * block; x < Math.min(nx, (i + 1) * block); x++)
              if (Number.isFinite(plane[y * nx + x])) inside.push(plane[y * nx + x]!);
          const found = r.plane[j * r.nx + i]!;
          if (inside.length === 0) expect(found).toBeNaN();
          else expect(Math.abs(found - inside.reduce((a, b) => a + b, 0) / inside.length)).toBeLessThan(2e-4);
        }
    }),
  );
});

test('refuses what does not fit', () => {
  expect(() => blockAverage(new Float32Array(5), 2, 2, 2)).toThrow('5 numbers cannot be 2 by 2 pixels');
  expect(() => blockAverage(new Float32Array(4), 2, 2, 0)).toThrow('0 is not a block size');
  expect(() => blockAverage(new Float32Array(4), 2, 2, 1.5)).toThrow('1.5');
});

test('the block for a size', () => {
  expect([blockFor(512, 300, 512), blockFor(513, 300, 512), blockFor(100, 2000, 96)]).toEqual([1, 2, 21]);
});
