import { seededRandom } from '@/shared/random';
import { gaussianFields } from './gaussianField';
import type { CubeRecipe } from './recipe';

/** Turbulent gas without shells. */
export interface Gas {
  /** Fill one channel, K, row y = 0 first. */
  fill(plane: Float32Array, channel: number): void;
}

/** Structures reach over this many channels for each pixel of their size on the sky. */
const CHANNELS_PER_PIXEL = 1.5;
/** Spread of the height (ln) and of the width (share) of a layer over the sky. */
const HEIGHT_SPREAD = 0.3;
const WIDTH_SPREAD = 0.15;
/** Fields of the layers vary more slowly over the sky than the clouds in them. */
const LAYER_SLOPE = -3.2;

/**
 * Gas whose line is a sum of layers, each with a height, a velocity and a width that wander over the sky, times a
 * log-normal pattern in position and velocity. Part of the pattern is filaments: a Gaussian field's zero surfaces.
 */
export function turbulentGas(
  { shape, gas }: Pick<CubeRecipe, 'shape' | 'gas'>,
  velocityOf: (channel: number) => number,
  seed: number,
): Gas {
  const { nx, ny, channels } = shape;
  const size = nx * ny;
  const random = seededRandom(seed);
  const [clouds, sheets] = gaussianFields(
    { shape: [nx, ny, channels], slope: gas.slope, stretch: [1, 1, CHANNELS_PER_PIXEL] },
    random,
  );
  const layers = gas.layers.map((layer) => {
    const [height, shift] = gaussianFields({ shape: [nx, ny], slope: LAYER_SLOPE }, random);
    const [width] = gaussianFields({ shape: [nx, ny], slope: LAYER_SLOPE }, random);
    return { ...layer, height, shift, spread: width };
  });
  const a = gas.contrast * Math.sqrt(1 - gas.filaments);
  const f = gas.contrast * Math.sqrt(gas.filaments);
  return {
    fill(plane, channel) {
      const v = velocityOf(channel);
      for (let i = 0; i < size; i++) {
        let line = 0;
        for (const layer of layers) {
          const width = layer.width * Math.max(1 + WIDTH_SPREAD * layer.spread[i]!, 0.4);
          const off = (v - layer.velocity - layer.wander * layer.shift[i]!) / width;
          line += layer.brightness * Math.exp(HEIGHT_SPREAD * layer.height[i]! - 0.5 * off * off);
        }
        const at = channel * size + i;
        plane[i] = line * Math.exp(a * clouds[at]! + f * filament(sheets[at]!) - 0.5 * gas.contrast ** 2);
      }
    },
  };
}

/** Bright along the zeros of a normal variable; mean 0 and variance 1: |x| has mean sqrt(2/pi), variance 1 - 2/pi. */
const filament = (x: number) => (Math.sqrt(2 / Math.PI) - Math.abs(x)) / Math.sqrt(1 - 2 / Math.PI);
