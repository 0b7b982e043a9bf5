import { HYDROGEN_HZ } from '@/shared/sky/doppler';
import type { WcsSpec } from '@/shared/sky/wcsSpec';
import type { CubeRecipe } from './recipe';

/**
 * World coordinates of a synthetic cube: what its header says, for `buildWcs`.
 *
 * A cylindrical projection has its reference on the equator, where its axes are what they are meant to be; the
 * latitude is in the reference pixel.
 */
export function wcsOfRecipe({
  shape,
  sky,
  velocity,
}: Pick<CubeRecipe, 'shape' | 'sky' | 'velocity'>): WcsSpec {
  const { nx, ny, channels } = shape;
  const { projection, centre, pixel } = sky;
  const x = (nx - 1) / 2;
  const y = (ny - 1) / 2;
  const tangent = projection === 'TAN';
  return {
    version: 1,
    sky: {
      frame: 'galactic',
      equinox: null,
      projection,
      referencePixel: [x, tangent ? y : thousandth(y - centre.b / pixel)],
      reference: [centre.l, tangent ? centre.b : 0],
      matrix: [-pixel, 0, 0, pixel],
      lonPole: null,
      latPole: null,
      parameters: [],
      size: [nx, ny],
    },
    spectral: {
      type: 'VRAD',
      linearIn: null,
      referenceChannel: 0,
      reference: thousandth(1000 * velocity.first),
      step: thousandth(1000 * velocity.step),
      channels,
      restFrequencyHz: HYDROGEN_HZ,
      restAssumed: false,
      convention: 'radio',
      frame: 'LSRK',
    },
  };
}

/** Short decimals in the header. */
const thousandth = (value: number) => Math.round(1000 * value) / 1000;
