import { isProblem } from '@/shared/contract/problem';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import { findImage } from './findImage';

const SKY = [
  "CTYPE1  = 'GLON-CAR'",
  "CTYPE2  = 'GLAT-CAR'",
  'CRVAL1  = 10.0',
  'CDELT1  = -0.1',
  'CDELT2  = 0.1',
];
const FLAT = ['BITPIX  = 8', 'NAXIS   = 2', 'NAXIS1  = 4', 'NAXIS2  = 3', ...SKY];
const CUBE = [
  'BITPIX  = 8',
  'NAXIS   = 3',
  'NAXIS1  = 4',
  'NAXIS2  = 3',
  'NAXIS3  = 2',
  ...SKY,
  "CTYPE3  = 'VRAD'",
];
const data = new Uint8Array(2880).fill(7);
const first = (cards: string[]) => [headerBytesOf(['SIMPLE  =                    T', ...cards]), data];
const extension = (cards: string[]) => [headerBytesOf(["XTENSION= 'IMAGE'", ...cards]), data];
const empty = headerBytesOf(['SIMPLE  =                    T', 'BITPIX  = 8', 'NAXIS   = 0']);
const table = [
  headerBytesOf(["XTENSION= 'BINTABLE'", 'BITPIX  = 8', 'NAXIS   = 2', 'NAXIS1  = 4', 'NAXIS2  = 3']),
  data,
];

const find = (parts: (Uint8Array | Uint8Array[])[], hdu?: number) => {
  const file = new Uint8Array(Buffer.concat(parts.flat()));
  return findImage(async (offset, length) => file.subarray(offset, offset + length), file.length, { hdu });
};
const refusal = async (parts: (Uint8Array | Uint8Array[])[], hdu?: number) => {
  const failure = await find(parts, hdu).catch((error: unknown) => error);
  if (!isProblem(failure)) throw new Error('not refused');
  return failure;
};

it('takes the primary image', async () => {
  expect((await find([first(FLAT)])).head).toMatchObject({
    hdu: 0,
    dataOffset: 2880,
    shape: { nx: 4, ny: 3 },
  });
});

it('passes tables and cubes on the way to the first image of the sky', async () => {
  const { head } = await find([empty, table, extension(CUBE), extension(FLAT), extension(FLAT)]);
  expect(head).toMatchObject({ hdu: 3, dataOffset: 4 * 2880 + 2 * 2880 });
});

it('looks at the chosen HDU alone', async () => {
  const file = [first(FLAT), extension(CUBE), extension(FLAT)];
  expect((await find(file, 2)).head).toMatchObject({ hdu: 2, dataOffset: 5 * 2880 });
  expect(await refusal(file, 1)).toMatchObject({ type: 'fits-image', detail: expect.stringMatching(/cube/) });
  expect(await refusal(file, 3)).toMatchObject({ type: 'invalid-input', extra: { field: 'hdu' } });
});

it('says of a file without one what it holds', async () => {
  expect(await refusal([first(CUBE)])).toMatchObject({
    type: 'fits-image',
    detail: expect.stringMatching(/This is a cube/),
  });
  expect(await refusal([empty, table])).toMatchObject({
    type: 'fits-image',
    detail: expect.stringMatching(/no image/),
  });
  expect(await refusal([new Uint8Array(Buffer.from('<html>'))])).toMatchObject({ type: 'not-fits' });
  expect(await refusal([])).toMatchObject({ type: 'not-fits' });
  expect(await refusal([first(FLAT)[0]!])).toMatchObject({
    type: 'fits-truncated',
    extra: { missingBytes: 12 },
  });
});

it('stops at a card that cannot be used rather than passing the image by', async () => {
  const bad = FLAT.map((card) => card.replace('CAR', 'QQQ'));
  expect(await refusal([first(bad), extension(FLAT)])).toMatchObject({
    type: 'fits-card',
    extra: { card: 'CTYPE1' },
  });
});
