import { fitsHeader, padded, type HeaderEntry } from './fitsHeader';
import type { CubeRecipe } from './recipe';
import { wcsOfRecipe } from './wcsOfRecipe';

/** The stored integer for a blank, and how many others a 16-bit cube uses. */
const BLANK = -32768;
const LEVELS = 65_000;

/** Linear scaling of stored integers: value = bzero + bscale x stored. */
interface Scale {
  bscale: number;
  bzero: number;
}

/**
 * A synthetic cube as a FITS file of one image: 32-bit floating point with NaN for blanks, or 16-bit integers whose
 * step is a 65 000th of the range (so off by half of that at most), with BLANK.
 *
 * @param values as `makeCube` gives them
 * @throws RangeError when the values do not fill the shape
 */
export function writeFits(recipe: CubeRecipe, values: Float32Array): Uint8Array<ArrayBuffer> {
  const { nx, ny, channels } = recipe.shape;
  if (values.length !== nx * ny * channels)
    throw new RangeError(`${values.length} values do not fill ${nx} x ${ny} x ${channels}`);
  const scale = recipe.store === 'int16' ? scaleFor(values) : null;
  const header = fitsHeader(headerEntries(recipe, scale));
  const size = scale ? 2 : 4;
  const bytes = new Uint8Array(header.length + padded(size * values.length));
  bytes.set(header);
  const view = new DataView(bytes.buffer, header.length);
  if (scale)
    for (let i = 0; i < values.length; i++) {
      const value = values[i]!;
      const stored = Number.isNaN(value) ? BLANK : Math.round((value - scale.bzero) / scale.bscale);
      view.setInt16(2 * i, stored);
    }
  else for (let i = 0; i < values.length; i++) view.setFloat32(4 * i, values[i]!);
  return bytes;
}

function scaleFor(values: Float32Array): Scale {
  let [low, high] = [Infinity, -Infinity];
  for (const value of values) {
    if (value < low) low = value;
    if (value > high) high = value;
  }
  if (!(low < high)) return { bscale: 1, bzero: low === Infinity ? 0 : low };
  // nine digits keep the cards short; the reserve of 500 levels takes up what rounding them moves
  const short = (value: number) => Number(value.toPrecision(9));
  return { bscale: short((high - low) / LEVELS), bzero: short((high + low) / 2) };
}

/** The cards of a synthetic cube, in the order of the file. */
function headerEntries(recipe: CubeRecipe, scale: Scale | null = null): HeaderEntry[] {
  const { shape, beam } = recipe;
  const { sky, spectral } = wcsOfRecipe(recipe);
  const entry = (keyword: string, value: HeaderEntry['value'], comment?: string) => ({
    keyword,
    value,
    comment,
  });
  return [
    entry('SIMPLE', true, 'conforms to the FITS standard'),
    entry('BITPIX', recipe.store === 'int16' ? 16 : -32),
    entry('NAXIS', 3),
    entry('NAXIS1', shape.nx),
    entry('NAXIS2', shape.ny),
    entry('NAXIS3', shape.channels),
    ...(scale
      ? [
          entry('BSCALE', scale.bscale, 'K per stored unit'),
          entry('BZERO', scale.bzero, 'K at stored 0'),
          entry('BLANK', BLANK, 'stored where there is no value'),
        ]
      : []),
    entry('BUNIT', 'K', 'brightness temperature'),
    entry('OBJECT', recipe.object, 'invented'),
    entry('CTYPE1', `GLON-${sky.projection}`),
    entry('CUNIT1', 'deg'),
    entry('CRPIX1', sky.referencePixel[0] + 1),
    entry('CRVAL1', sky.reference[0]),
    entry('CDELT1', sky.matrix[0]),
    entry('CTYPE2', `GLAT-${sky.projection}`),
    entry('CUNIT2', 'deg'),
    entry('CRPIX2', sky.referencePixel[1] + 1),
    entry('CRVAL2', sky.reference[1]),
    entry('CDELT2', sky.matrix[3]),
    entry('CTYPE3', 'VRAD', 'radio velocity'),
    entry('CUNIT3', 'm/s'),
    entry('CRPIX3', spectral.referenceChannel + 1),
    entry('CRVAL3', spectral.reference),
    entry('CDELT3', spectral.step),
    entry('RESTFRQ', spectral.restFrequencyHz!, 'Hz'),
    entry('SPECSYS', 'LSRK'),
    entry('BMAJ', beam.major, 'deg, full width at half maximum'),
    entry('BMIN', beam.minor, 'deg'),
    entry('BPA', 0, 'deg'),
    entry('COMMENT', 'Synthetic: computed from a recipe, not observed. No such object exists.'),
    entry('COMMENT', `Made by Outswell, seed ${recipe.seed}.`),
  ];
}
