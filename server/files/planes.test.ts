import { isProblem } from '@/shared/contract/problem';
import { describeCube } from '@/shared/fits/cubeHead';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import type { ByteSource } from './byteSource';
import { readPixel, readPlane, readPlanes } from './planes';

const NX = 5;
const NY = 4;
const CHANNELS = 3;
/** Every pixel has its own value, whatever the order of the axes. */
const valueAt = (x: number, y: number, channel: number) => 100 * channel + 10 * y + x;

const LENGTHS = { x: NX, y: NY, channel: CHANNELS };
const TYPES = { x: 'GLON-CAR', y: 'GLAT-CAR', channel: 'VRAD' };
type Axis = keyof typeof LENGTHS;

function cube(order: Axis[]) {
  const cards = ['SIMPLE  = T', 'BITPIX  = -32', 'NAXIS   = 3'];
  order.forEach((axis, i) => {
    cards.push(`NAXIS${i + 1}  = ${LENGTHS[axis]}`, `CTYPE${i + 1}  = '${TYPES[axis]}'`);
    cards.push(`CRVAL${i + 1}  = 0.0`, `CRPIX${i + 1}  = 1.0`, `CDELT${i + 1}  = 1.0`);
  });
  const header = headerBytesOf(cards);
  const file = new Uint8Array(header.length + 4 * NX * NY * CHANNELS);
  file.set(header);
  const view = new DataView(file.buffer, header.length);
  const [a, b, c] = order as [Axis, Axis, Axis];
  const at = { x: 0, y: 0, channel: 0 };
  let i = 0;
  for (at[c] = 0; at[c] < LENGTHS[c]; at[c]++)
    for (at[b] = 0; at[b] < LENGTHS[b]; at[b]++)
      for (at[a] = 0; at[a] < LENGTHS[a]; at[a]++) view.setFloat32(4 * i++, valueAt(at.x, at.y, at.channel));
  return { file, head: describeCube(header, file.length) };
}

const sourceOf = (file: Uint8Array): ByteSource => ({
  size: file.length,
  read: async (offset, length) => file.subarray(offset, offset + length),
  close: async () => undefined,
});
const wanted = (channel: number) =>
  Array.from({ length: NX * NY }, (_, i) => valueAt(i % NX, Math.floor(i / NX), channel));

describe.each([
  [['x', 'y', 'channel']],
  [['y', 'x', 'channel']],
  [['x', 'channel', 'y']],
  [['y', 'channel', 'x']],
  [['channel', 'x', 'y']],
  [['channel', 'y', 'x']],
] as [Axis[]][])('a cube of axes %s', (order) => {
  const { file, head } = cube(order);
  const source = sourceOf(file);

  it('gives each channel row by row', async () => {
    const planes = [];
    for await (const { channel, values } of readPlanes(source, head)) {
      expect(values).toBeInstanceOf(Float32Array);
      planes.push([channel, [...values]]);
    }
    expect(planes).toEqual([0, 1, 2].map((k) => [k, wanted(k)]));
  });

  it('gives one channel, some channels, one pixel', async () => {
    const out = new Float64Array(NX * NY);
    expect(await readPlane(source, head, 2, out)).toBe(0);
    expect([...out]).toEqual(wanted(2));
    const some = [];
    for await (const { values } of readPlanes(source, head, { from: 1, to: 3, precise: true }))
      some.push([...values]);
    expect(some).toEqual([wanted(1), wanted(2)]);
    expect(await readPixel(source, head, 3, 2, 1)).toBe(valueAt(3, 2, 1));
  });

  it('says so when the file ends early', async () => {
    const short = sourceOf(file.subarray(0, file.length - 8));
    const failure = await readPlane(short, head, 2, new Float32Array(NX * NY)).catch(
      (error: unknown) => error,
    );
    expect(isProblem(failure) && failure.type).toBe('fits-truncated');
  });
});
