import { describeCube } from '@/shared/fits/cubeHead';
import { decodePixels } from '@/shared/fits/decode';
import { planeStatistics } from '@/shared/fits/statistics';
import { fitsHeader } from './fitsHeader';
import { makeCube } from './makeCube';
import type { CubeRecipe } from './recipe';
import { wcsOfRecipe } from './wcsOfRecipe';
import { writeFits } from './writeFits';

const recipe = (store: CubeRecipe['store'], projection: CubeRecipe['sky']['projection']): CubeRecipe => ({
  object: 'Test',
  seed: 9,
  shape: { nx: 40, ny: 36, channels: 10 },
  sky: { projection, centre: { l: 151.3, b: 21.7 }, pixel: 0.05 },
  velocity: { first: -31.7, step: 1.03 },
  beam: { major: 0.16, minor: 0.15 },
  gas: {
    layers: [{ brightness: 12, velocity: -26, width: 15, wander: 3 }],
    slope: -3.3,
    contrast: 0.4,
    filaments: 0.2,
  },
  noise: 0.3,
  shells: [],
  store,
  blankCorner: 6,
});

/** Header bytes up to and with END, and the pixels after them. */
function open(bytes: Uint8Array) {
  const text = String.fromCharCode(...bytes.subarray(0, 2880 * 2));
  const blocks = Math.ceil((text.search(/END {77}/) + 80) / 2880);
  const head = describeCube(bytes.subarray(0, 2880 * blocks), bytes.length);
  const values = new Float32Array(head.dataBytes / (Math.abs(head.bitpix) / 8));
  decodePixels(bytes.slice(head.dataOffset, head.dataOffset + head.dataBytes), head, values);
  return { head, values };
}

test.each(['CAR', 'SFL', 'TAN'] as const)(
  'the header of a %s cube says what the recipe says',
  (projection) => {
    const made = recipe('float32', projection);
    const bytes = writeFits(made, makeCube(made));
    const { head } = open(bytes);
    expect(bytes.length % 2880).toBe(0);
    expect(head.cautions).toEqual([]);
    expect(head).toMatchObject({
      shape: made.shape,
      bitpix: -32,
      unit: 'K',
      object: 'Test',
      frame: 'galactic',
      projection,
      spectral: { type: 'VRAD', convention: 'radio', frame: 'LSRK', restFrequencyHz: 1420405751.768 },
      beam: { majorDeg: 0.16, minorDeg: 0.15, positionAngleDeg: 0 },
    });
    expect(head.spectral.velocities[0]).toBeCloseTo(-31.7, 9);
    expect(head.spectral.velocities[1]).toBeCloseTo(-31.7 + 9 * 1.03, 9);
    const wcs = wcsOfRecipe(made);
    expect(head.wcs.sky.referencePixel[0]).toBeCloseTo(wcs.sky.referencePixel[0], 9);
    expect(head.wcs.sky.referencePixel[1]).toBeCloseTo(wcs.sky.referencePixel[1], 9);
    expect({ ...head.wcs.sky, referencePixel: null }).toEqual({ ...wcs.sky, referencePixel: null });
    expect(head.wcs.spectral).toEqual(wcs.spectral);
  },
);

test('floating-point pixels come back to the last bit, blanks as blanks', () => {
  const made = recipe('float32', 'CAR');
  const cube = makeCube(made);
  expect(open(writeFits(made, cube)).values).toEqual(cube);
});

test('16-bit pixels come back within half a step, blanks as blanks', () => {
  const made = recipe('int16', 'TAN');
  const cube = makeCube(made);
  const { head, values } = open(writeFits(made, cube));
  expect(head).toMatchObject({ bitpix: 16, blank: '-32768' });
  const worst = cube.reduce(
    (most, v, i) => Math.max(most, Number.isNaN(v) ? 0 : Math.abs(v - values[i]!)),
    0,
  );
  expect(worst).toBeLessThan(0.51 * head.bscale);
  expect(worst).toBeGreaterThan(0.4 * head.bscale);
  const blanks = (a: Float32Array) => Array.from(a.keys()).filter((i) => Number.isNaN(a[i]!));
  expect(blanks(values)).toEqual(blanks(cube));
  const plane = values.subarray(0, 40 * 36);
  expect(planeStatistics(plane, new Float64Array(plane.length)).blank).toBe(21);
});

test('a cube of one value, or of blanks alone, is written too', () => {
  const made = { ...recipe('int16', 'CAR'), shape: { nx: 2, ny: 2, channels: 2 } };
  expect([...open(writeFits(made, new Float32Array(8).fill(2.5))).values]).toEqual(Array(8).fill(2.5));
  expect([...open(writeFits(made, new Float32Array(8).fill(NaN))).values]).toEqual(Array(8).fill(NaN));
  expect(() => writeFits(made, new Float32Array(7))).toThrow(/do not fill 2 x 2 x 2/);
});

test('cards are eighty columns of printable text, or refused', () => {
  const header = fitsHeader([
    { keyword: 'SIMPLE', value: true },
    {
      keyword: 'OBJECT',
      value: "Ansa's field",
      comment: 'a comment so long that it runs off the end of the card',
    },
  ]);
  const text = String.fromCharCode(...header);
  expect(header).toHaveLength(2880);
  expect(text.slice(0, 30)).toBe('SIMPLE  =                    T');
  expect(text.slice(80, 105)).toBe("OBJECT  = 'Ansa''s field'");
  expect(text.slice(160, 240)).toBe('END'.padEnd(80));
  expect(() => fitsHeader([{ keyword: 'OBJECT', value: 'x'.repeat(80) }])).toThrow(/OBJECT does not fit/);
  expect(() => fitsHeader([{ keyword: 'toolong99', value: 1 }])).toThrow(/does not fit/);
  expect(() => fitsHeader([{ keyword: 'CRVAL1', value: NaN }])).toThrow(/NaN cannot be written/);
});
