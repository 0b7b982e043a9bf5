import { mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { isProblem } from '@/shared/contract/problem';
import { imageFile, NX, NY, tiledFile } from '@/tests/api/skyImageFile';
import { readImageFile } from './imageFile';

const folder = mkdtempSync(join(tmpdir(), 'outswell-image-'));
afterAll(() => rmSync(folder, { recursive: true }));

const [path, copyPath] = [join(folder, 'sent'), join(folder, 'copy')];
function read(bytes: Uint8Array, limits?: Parameters<typeof readImageFile>[2]) {
  writeFileSync(path, bytes);
  rmSync(copyPath, { force: true });
  return readImageFile(path, copyPath, limits);
}
async function refusal(bytes: Uint8Array, limits?: Parameters<typeof readImageFile>[2]) {
  const failure = await read(bytes, limits).catch((error: unknown) => error);
  if (!isProblem(failure)) throw new Error('not refused');
  return failure;
}

it.each([
  ['a plain file, which is read as it is', imageFile(), false, -32, 0],
  ['a gzip file', gzipSync(imageFile()), true, -32, 0],
  ['tiles', tiledFile(), true, 16, 1],
  ['tiles in a gzip file', gzipSync(tiledFile()), true, 16, 1],
])('reads %s', async (_what, bytes, isCopied, bitpix, hdu) => {
  const found = await read(bytes);
  expect(found).toMatchObject({
    isCopied,
    head: { bitpix, hdu, container: 'plain', shape: { nx: NX, ny: NY }, unit: 'Rayleigh' },
  });
  expect(readdirSync(folder).sort()).toEqual(isCopied ? ['copy', 'sent'] : ['sent']);
});

it('stops where a gzip file or tiles would be too large when expanded', async () => {
  const limits = { maxExpandedBytes: 2 * NX * NY - 1 };
  const long = Buffer.concat([imageFile(), Buffer.alloc(4e6)]);
  for (const bytes of [gzipSync(long), tiledFile()])
    expect(await refusal(bytes, limits)).toMatchObject({
      type: 'too-large',
      detail: expect.stringMatching(/2399/),
    });
});

it('does not expand what is no FITS', async () => {
  const bomb = gzipSync(Buffer.alloc(20e6));
  expect(await refusal(bomb)).toMatchObject({ type: 'not-fits' });
  expect(readdirSync(folder).length).toBeLessThanOrEqual(2);
});

it('refuses more pixels than it is to read, and says how many there are', async () => {
  expect(await refusal(imageFile(), { maxPixels: NX * NY - 1 })).toMatchObject({
    type: 'too-large',
    detail: expect.stringMatching(/40 by 30 pixels; at most 1199/),
  });
});

it('refuses an image of blanks, and takes one with a single number', async () => {
  expect(await refusal(imageFile({}, () => NaN))).toMatchObject({ type: 'fits-image' });
  expect((await read(imageFile({}, (x, y) => (x + y === 68 ? 1 : NaN)))).isCopied).toBe(false);
});
