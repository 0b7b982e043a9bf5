import { isProblem } from '@/shared/contract/problem';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import { checkBeginning, findCube, type ReadBytes } from './findCube';

const IMAGE = ['BITPIX  = 8', 'NAXIS   = 3', 'NAXIS1  = 4', 'NAXIS2  = 3', 'NAXIS3  = 2'];
const WCS = [
  "CTYPE1  = 'GLON-CAR'",
  "CTYPE2  = 'GLAT-CAR'",
  "CTYPE3  = 'VRAD'",
  'CRPIX1  = 1',
  'CRPIX2  = 1',
  'CRPIX3  = 1',
  'CRVAL1  = 10.0',
  'CRVAL2  = 0.0',
  'CRVAL3  = 0.0',
  'CDELT1  = -0.1',
  'CDELT2  = 0.1',
  'CDELT3  = 1000.0',
  "CUNIT3  = 'm/s'",
  'RESTFRQ = 1420405751.768',
  "SPECSYS = 'LSRK'",
  "BUNIT   = 'K'",
];
const data = new Uint8Array(2880).fill(7);
const cubeHdu = (first: string) => [headerBytesOf([first, ...IMAGE, ...WCS]), data];
const emptyPrimary = headerBytesOf(['SIMPLE  = T', 'BITPIX  = 8', 'NAXIS   = 0']);
const flat = [
  headerBytesOf(["XTENSION= 'IMAGE'", 'BITPIX  = 8', 'NAXIS   = 2', 'NAXIS1  = 4', 'NAXIS2  = 3']),
  data,
];
const table = [
  headerBytesOf([
    "XTENSION= 'BINTABLE'",
    'BITPIX  = 8',
    'NAXIS   = 2',
    'NAXIS1  = 4',
    'NAXIS2  = 3',
    'PCOUNT  = 2880',
    'GCOUNT  = 1',
  ]),
  data,
  data,
];

function joined(...parts: (Uint8Array | Uint8Array[])[]): Uint8Array {
  const all = parts.flat();
  const file = new Uint8Array(all.reduce((sum, p) => sum + p.length, 0));
  let at = 0;
  for (const part of all) {
    file.set(part, at);
    at += part.length;
  }
  return file;
}
const readerOf =
  (file: Uint8Array): ReadBytes =>
  async (offset, length) =>
    file.subarray(offset, offset + length);
const find = (file: Uint8Array, hdu?: number) => findCube(readerOf(file), file.length, { hdu });
const refusal = async (file: Uint8Array, hdu?: number) => {
  const failure = await find(file, hdu).catch((error: unknown) => error);
  if (!isProblem(failure)) throw new Error('no problem');
  return failure;
};

const SIMPLE = 'SIMPLE  =                    T';
const PRIMARY = joined(cubeHdu(SIMPLE));
/** Cards in free format start with "SIMPLE  =" all the same. */
const EXTENSION = cubeHdu("XTENSION= 'IMAGE'");

describe('findCube', () => {
  it('takes the primary image', async () => {
    expect(await find(PRIMARY)).toMatchObject({ hdu: 0, dataOffset: 2880, cautions: [] });
  });

  it('passes tables and flat images on the way', async () => {
    expect(await find(joined(emptyPrimary, table, flat, EXTENSION))).toMatchObject({
      hdu: 3,
      dataOffset: 2880 + 8640 + 5760 + 2880,
      cautions: [],
    });
  });

  it('takes the first of two cubes with a caution, and the named one without', async () => {
    const two = joined(emptyPrimary, EXTENSION, EXTENSION);
    expect(await find(two)).toMatchObject({
      hdu: 1,
      cautions: [expect.stringMatching(/HDU 1 is read, HDU 2 is not/)],
    });
    expect(await find(two, 2)).toMatchObject({ hdu: 2, cautions: [] });
  });

  it('lists the images that could be chosen, and what can be read of them', async () => {
    const file = joined(emptyPrimary, table, flat, EXTENSION, EXTENSION);
    const hdus = [
      { index: 2, name: '', shape: [4, 3], usable: false },
      { index: 3, name: '', shape: [4, 3, 2], usable: true },
      { index: 4, name: '', shape: [4, 3, 2], usable: true },
    ];
    expect((await find(file)).choices).toEqual({ hdus, stokes: [] });
    expect((await find(file, 4)).choices).toEqual({ hdus, stokes: [] });
    expect((await find(PRIMARY)).choices!.hdus).toEqual([
      { index: 0, name: '', shape: [4, 3, 2], usable: true },
    ]);
  });

  it('cautions about bytes behind, but not about zeros', async () => {
    expect((await find(joined(PRIMARY, new Uint8Array(100).fill(1)))).cautions).toEqual([
      expect.stringMatching(/100 bytes after the data/),
    ]);
    expect((await find(joined(PRIMARY, new Uint8Array(5760)))).cautions).toEqual([]);
  });

  it('reads a file whose last block is not filled up', async () => {
    expect(await find(PRIMARY.subarray(0, 2880 + 24))).toMatchObject({ hdu: 0, cautions: [] });
    expect(await refusal(PRIMARY.subarray(0, 2880 + 23))).toMatchObject({ type: 'fits-truncated' });
  });

  it('does not wait for a file that has shrunk', async () => {
    const shrunk = findCube(readerOf(PRIMARY.subarray(0, 1000)), PRIMARY.length);
    await expect(shrunk).rejects.toThrow(/ends inside its header/);
  });

  it('says what a file without a cube holds', async () => {
    expect((await refusal(joined(emptyPrimary, table))).detail).toContain('a table and no image');
    expect((await refusal(emptyPrimary)).detail).toContain('no image');
    expect((await refusal(joined(emptyPrimary, table, flat))).detail).toContain('2 axes');
    expect((await refusal(new Uint8Array(0))).detail).toContain('empty');
    expect(await refusal(joined(emptyPrimary, EXTENSION), 5)).toMatchObject({ extra: { field: 'hdu' } });
  });
});

describe('checkBeginning', () => {
  it('accepts a cube as soon as its header is there', async () => {
    expect(await checkBeginning(PRIMARY.subarray(0, 2879), PRIMARY.length)).toBeNull();
    expect(await checkBeginning(PRIMARY.subarray(0, 2880), PRIMARY.length)).toMatchObject({ hdu: 0 });
  });

  it('waits for a cube that lies further on', async () => {
    const file = joined(emptyPrimary, table, EXTENSION);
    const start = file.length - 5760;
    for (const arrived of [10, 2880, start, start + 5, start + 2879]) {
      expect(await checkBeginning(file.subarray(0, arrived), file.length)).toBeNull();
    }
    expect(await checkBeginning(file.subarray(0, start + 2880), file.length)).toMatchObject({ hdu: 2 });
  });

  it('refuses at the first byte that is wrong', async () => {
    await expect(checkBeginning(new Uint8Array([0x89, 0x50, 0x4e, 0x47]), 9e9)).rejects.toThrow(/PNG/);
    await expect(checkBeginning(joined(flat), 9e9)).rejects.toThrow(/primary header/);
    await expect(checkBeginning(PRIMARY.subarray(0, 2880), 2900)).rejects.toThrow(/too early/);
  });
});
