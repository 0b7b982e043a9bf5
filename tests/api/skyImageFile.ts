/** Small images of the sky made in the test, as plain FITS and as tiles of it. */
import { gzipSync } from 'node:zlib';
import { headerBytesOf } from '../reference/headerBytes';
import { cubeFile, type CubeSpec } from './cubeFile';

export const NX = 40;
export const NY = 30;
/** Whole numbers, each pixel its own. */
export const valueAt = (x: number, y: number) => y * NX + x;

/** An image of the sky of the other test files: 40 by 30 pixels about l = 120, b = 0. */
export const imageFile = (
  cards: CubeSpec['cards'] = {},
  value: (x: number, y: number) => number = valueAt,
): Buffer =>
  cubeFile({
    nx: NX,
    ny: NY,
    channels: 1,
    cards: {
      ...{ NAXIS: 2, NAXIS3: null, CTYPE3: null, CRVAL3: null, CRPIX3: null, CDELT3: null, CUNIT3: null },
      ...{ SPECSYS: null, RESTFRQ: null, BUNIT: 'Rayleigh', ...cards },
    },
    value,
  });

/** The same sky as 16-bit integers in a table of tiles (FITS Standard 4.0, section 10), a row of pixels each, gzip'ed. */
export function tiledFile(): Buffer {
  const tiles = Array.from({ length: NY }, (_, y) => {
    const row = Buffer.alloc(2 * NX);
    for (let x = 0; x < NX; x++) row.writeInt16BE(valueAt(x, y), 2 * x);
    return gzipSync(row);
  });
  const table = Buffer.alloc(8 * NY);
  let heapBytes = 0;
  tiles.forEach((tile, y) => {
    table.writeInt32BE(tile.length, 8 * y);
    table.writeInt32BE(heapBytes, 8 * y + 4);
    heapBytes += tile.length;
  });
  const data = Buffer.concat([table, ...tiles]);
  const primary = headerBytesOf(['SIMPLE  =                    T', 'BITPIX  = 8', 'NAXIS   = 0']);
  const header = headerBytesOf([
    ...["XTENSION= 'BINTABLE'", 'BITPIX  = 8', 'NAXIS   = 2', 'NAXIS1  = 8', `NAXIS2  = ${NY}`],
    ...[`PCOUNT  = ${heapBytes}`, 'GCOUNT  = 1', 'TFIELDS = 1'],
    ...["TTYPE1  = 'COMPRESSED_DATA'", "TFORM1  = '1PB'", 'ZIMAGE  = T', "ZCMPTYPE= 'GZIP_1'"],
    ...['ZBITPIX = 16', 'ZNAXIS  = 2', `ZNAXIS1 = ${NX}`, `ZNAXIS2 = ${NY}`],
    ...["CTYPE1  = 'GLON-CAR'", "CTYPE2  = 'GLAT-CAR'", 'CRVAL1  = 120.0', 'CRVAL2  = 0.0'],
    ...['CRPIX1  = 20.5', 'CRPIX2  = 15.5', 'CDELT1  = -0.05', 'CDELT2  = 0.05', "BUNIT   = 'Rayleigh'"],
  ]);
  return Buffer.concat([primary, header, data, Buffer.alloc((2880 - (data.length % 2880)) % 2880)]);
}
