import { describeCube } from '@/shared/fits/cubeHead';
import { describeImage } from '@/shared/fits/imageHead';
import { buildSky } from '@/shared/sky/wcs';
import { cubeFile } from '@/tests/api/cubeFile';
import { imageFile } from '@/tests/api/skyImageFile';
import { blockAverage } from './blockAverage';
import { contoursOf } from './contours';
import { linesAcross } from './linesAcross';

const headerOf = (file: Buffer) => new Uint8Array(file.subarray(0, 2880));
/** A tangent-plane image in ICRS about l = 120, b = 0 (00:25:11, +62:43 or so), turned against the cube's grid. */
const image = describeImage(
  headerOf(
    imageFile({
      ...{ CTYPE1: 'RA---TAN', CTYPE2: 'DEC--TAN', CRVAL1: 6.3, CRVAL2: 62.7, CRPIX1: 100.5, CRPIX2: 100.5 },
      ...{ NAXIS1: 200, NAXIS2: 200, CDELT1: -0.02, CDELT2: 0.02, RADESYS: 'ICRS' },
    }),
  ),
);
const cube = describeCube(headerOf(cubeFile({ nx: 64, ny: 60, channels: 8 })));
const [from, to] = [buildSky(image.sky), buildSky(cube.wcs.sky)];
const onCube = ({ l, b }: { l: number; b: number }) => to.galacticToPixel(l, b);

/** A round cloud about one pixel of the cube, painted into the image by way of the sky. */
const CENTRE = { x: 30, y: 33 };
const plane = Float32Array.from({ length: 200 * 200 }, (_, i) => {
  const at = onCube(from.pixelToGalactic(i % 200, Math.floor(i / 200))!)!;
  return Math.hypot(at.x - CENTRE.x, at.y - CENTRE.y);
});

it.each([1, 4])('lays a contour where the cube shows the same sky, from blocks of %i pixels too', (block) => {
  const small = blockAverage(plane, 200, 200, block);
  const [contour] = contoursOf(small.plane, small.nx, small.ny, [9]);
  const path = linesAcross(contour!.lines, block, from, onCube, 20);
  expect(path).toHaveLength(1);
  expect(path[0]!.length).toBeGreaterThan(30);
  for (const { x, y } of path[0]!) expect(Math.hypot(x - CENTRE.x, y - CENTRE.y)).toBeCloseTo(9, 1);
});

it('cuts a line where the picture shows nothing, and where it jumps', () => {
  const line = [0, 1, 2, 3, 4, 5].map((x) => ({ x, y: 0 }));
  const flat = { pixelToGalactic: (x: number, y: number) => ({ l: x, b: y }) };
  const hole = linesAcross([line], 1, flat, ({ l, b }) => (l === 2 ? null : { x: l, y: b }), 10);
  expect(hole.map((piece) => piece.map(({ x }) => x))).toEqual([
    [0, 1],
    [3, 4, 5],
  ]);
  const seam = linesAcross([line], 1, flat, ({ l, b }) => ({ x: l < 3 ? l : l + 50, y: b }), 10);
  expect(seam.map((piece) => piece.length)).toEqual([3, 3]);
});
