/**
 * All that a synthetic cube is made from: the same recipe gives the same cube to the last bit. Angles in degrees,
 * velocities in km/s, brightness in K; pixels and channels count from 0 at their centres.
 */
export interface CubeRecipe {
  /** OBJECT of the file: an invented name. */
  object: string;
  /** Whole number; every random number comes from it. */
  seed: number;
  shape: { nx: number; ny: number; channels: number };
  sky: {
    /** Plate carree and sinusoidal have their reference on the equator, the tangent plane in the centre. */
    projection: 'CAR' | 'SFL' | 'TAN';
    centre: { l: number; b: number };
    /** Side of a pixel. */
    pixel: number;
  };
  /** Radio velocities, LSRK: of channel 0, and from one channel to the next (either sign). */
  velocity: { first: number; step: number };
  /** Full widths at half maximum; the major axis points north. */
  beam: { major: number; minor: number };
  gas: GasRecipe;
  /** Root mean square of the noise after the beam. */
  noise: number;
  shells: ShellRecipe[];
  store: 'float32' | 'int16';
  /** Pixels with x + y below this are blank, like the edge of a survey; 0 for none. */
  blankCorner?: number;
}

/** The turbulent gas before, behind and around the shells. */
export interface GasRecipe {
  /** Layers along the line of sight, each a Gaussian line whose height, centre and width vary over the sky. */
  layers: { brightness: number; velocity: number; width: number; wander: number }[];
  /** Exponent of the power spectrum in space and velocity, about -3 to -4. */
  slope: number;
  /** Standard deviation of ln brightness from place to place. */
  contrast: number;
  /** Share of it that is thin filaments, 0 ... 1. */
  filaments: number;
}

/**
 * A spherical shell at a finite distance whose centre has velocity vSys. Its gas leaves the centre at vExp and fills a
 * layer with a Gaussian profile in radius; the ridge of that layer subtends theta.
 */
export interface ShellRecipe {
  name: string;
  l: number;
  b: number;
  theta: number;
  vSys: number;
  vExp: number;
  /** Position angles between which the rim is seen, north through east; `to` may exceed 360. The whole: 0 to 360. */
  arc: { from: number; to: number };
  /** Standard deviation of the layer in radius, as a share of the radius. */
  thickness: number;
  /** Standard deviation of that ridge about a sphere, as a share of the radius; 0 for a perfect one. */
  ripple: number;
  /** Velocity dispersion of its gas. */
  dispersion: number;
  /** Standard deviation of ln brightness over the sphere. */
  clumps: number;
  /** Brightness of the rim at vSys without clumps, before the beam. */
  peak: number;
  /** Share of the surrounding gas that is gone from the interior, 0 ... 1. */
  hollow: number;
}

/** @throws RangeError naming what cannot be made */
export function checkRecipe(recipe: CubeRecipe): void {
  const require = (holds: boolean, what: string) => {
    if (!holds) throw new RangeError(`${recipe.object}: ${what}`);
  };
  const { nx, ny, channels } = recipe.shape;
  require([nx, ny, channels].every(
    (n) => Number.isInteger(n) && n > 0,
  ), 'the shape is whole numbers above 0');
  require(Number.isInteger(recipe.seed), 'the seed is a whole number');
  require(recipe.sky.pixel > 0 && Number.isFinite(recipe.sky.pixel), 'a pixel is wider than 0');
  require(recipe.velocity.step !== 0, 'the velocity step is not 0');
  require(recipe.beam.minor > 0 &&
    recipe.beam.major >= recipe.beam.minor, 'major and minor are above 0, in order');
  require(recipe.noise >= 0, 'the noise is not negative');
  for (const s of recipe.shells) {
    require(s.theta > 0 && s.theta < 90, `theta of ${s.name} lies between 0 and 90`);
    require(s.vExp > 0, `vExp of ${s.name} is above 0`);
    require(s.thickness > 0 && s.thickness < 0.3, `thickness of ${s.name} lies between 0 and 0.3`);
    require(s.ripple >= 0 && s.ripple < 0.1, `ripple of ${s.name} lies between 0 and 0.1`);
    require(s.dispersion > 0, `dispersion of ${s.name} is above 0`);
    require(s.arc.to > s.arc.from &&
      s.arc.to - s.arc.from <= 360, `the arc of ${s.name} runs forward, once at most`);
    require(s.hollow >= 0 && s.hollow <= 1, `hollow of ${s.name} lies between 0 and 1`);
  }
}
