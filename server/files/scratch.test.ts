import { withFloats } from './scratch';

test('an array is lent again once it has been given back, never to two at a time', async () => {
  let first: Float32Array | null = null;
  await withFloats(100, async (a) => {
    first = a;
    await withFloats(100, async (b) => expect(b.buffer).not.toBe(a.buffer));
  });
  await withFloats(60, async (c) => {
    expect(c.length).toBe(60);
    expect(c.buffer === first!.buffer || c.buffer.byteLength === 400).toBe(true);
  });
  await expect(withFloats(100, () => Promise.reject(new Error('no')))).rejects.toThrow('no');
  await withFloats(100, async (d) => expect(d.length).toBe(100));
});
