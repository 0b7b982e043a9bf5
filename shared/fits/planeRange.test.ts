import fc from 'fast-check';
import { isChannelContiguous, pixelOffset, placeSlice, planeSlices, type CubeLayout } from './planeRange';

/** A cube of three named axes and perhaps a fourth, in any order of the file. */
const cubes = fc
  .record({
    nx: fc.integer({ min: 1, max: 6 }),
    ny: fc.integer({ min: 1, max: 6 }),
    channels: fc.integer({ min: 2, max: 6 }),
    extra: fc.constantFrom(1, 2, 3),
    plane: fc.nat(2),
    order: fc.shuffledSubarray([0, 1, 2, 3], { minLength: 4 }),
  })
  .map(({ nx, ny, channels, extra, plane, order }) => {
    const lengths = [nx, ny, channels, extra];
    const layout = {
      naxis: order.map((axis) => lengths[axis]!),
      longitude: order.indexOf(0),
      latitude: order.indexOf(1),
      spectral: order.indexOf(2),
      ...(plane < extra && { stokes: { axis: order.indexOf(3), plane } }),
    };
    return { nx, ny, channels, head: { bitpix: 16, dataOffset: 2880, layout } satisfies CubeLayout };
  });

describe('planes of a cube in any axis order', () => {
  it('holds every pixel of the wanted channels once, in its place', () => {
    fc.assert(
      fc.property(
        cubes,
        fc.integer({ min: 2, max: 200 }),
        fc.nat(5),
        fc.nat(5),
        ({ nx, ny, channels, head }, most, a, b) => {
          const from = Math.min(a, b) % channels;
          const to = Math.min(channels, Math.max(a, b, from) + 1);
          const out = new Float64Array(nx * ny * (to - from)).fill(-1);
          let end = 0;
          for (const slice of planeSlices(head, from, to, most)) {
            expect(slice.length).toBeLessThanOrEqual(Math.max(2, most));
            expect(slice.offset).toBe(head.dataOffset + 2 * slice.element);
            expect(slice.offset).toBeGreaterThanOrEqual(end); // in order, nothing read twice
            end = slice.offset + slice.length;
            // A pixel's value is its own byte offset.
            const values = Float64Array.from({ length: slice.length / 2 }, (_, i) => slice.offset + 2 * i);
            placeSlice(head, slice, values, from, to, out);
          }
          for (let k = from; k < to; k++)
            for (let y = 0; y < ny; y++)
              for (let x = 0; x < nx; x++) {
                expect(out[(k - from) * nx * ny + y * nx + x]).toBe(pixelOffset(head, x, y, k));
              }
        },
      ),
    );
  });

  it('gives no places in a compressed file', () => {
    const layout = { naxis: [4, 4, 4], longitude: 0, latitude: 1, spectral: 2 };
    for (const container of ['gzip', 'tiled'] as const) {
      const head: CubeLayout = { bitpix: 16, dataOffset: 2880, layout, container };
      expect(() => [...planeSlices(head, 0, 1)]).toThrow(RangeError);
      expect(() => pixelOffset(head, 0, 0, 0)).toThrow(RangeError);
    }
  });

  it('takes the chosen plane of a fourth axis, wherever it lies', () => {
    fc.assert(
      fc.property(cubes, ({ nx, ny, channels, head }) => {
        const { naxis, longitude, latitude, spectral } = head.layout;
        const stokes = 'stokes' in head.layout ? head.layout.stokes : undefined;
        const at = naxis.map(() => 0);
        at[longitude] = nx - 1;
        at[latitude] = ny - 1;
        at[spectral] = channels - 1;
        if (stokes) at[stokes.axis] = stokes.plane;
        let element = 0;
        for (let i = naxis.length - 1; i >= 0; i--) element = element * naxis[i]! + at[i]!;
        expect(pixelOffset(head, nx - 1, ny - 1, channels - 1)).toBe(2880 + 2 * element);
      }),
    );
  });

  it('reads a channel in one piece where the spectral axis is slowest, and runs where it lies between', () => {
    const naxis = [512, 512, 128];
    const slow: CubeLayout = {
      bitpix: -32,
      dataOffset: 2880,
      layout: { naxis, longitude: 0, latitude: 1, spectral: 2 },
    };
    expect(isChannelContiguous(slow)).toBe(true);
    expect([...planeSlices(slow, 5, 6)]).toEqual([
      { offset: 2880 + 5 * 1048576, length: 1048576, element: 5 * 262144 },
    ]);
    const between: CubeLayout = {
      bitpix: -32,
      dataOffset: 0,
      layout: { naxis: [512, 128, 512], longitude: 0, latitude: 2, spectral: 1 },
    };
    const runs = [...planeSlices(between, 5, 6)];
    expect(runs).toHaveLength(512);
    expect(runs[1]).toEqual({ offset: 4 * 512 * 133, length: 2048, element: 512 * 133 });
  });
});
