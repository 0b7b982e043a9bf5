/**
 * The models of a shell, and the order of their parameters.
 *
 * Inside the fit every model starts with the same five numbers: offsets x (east) and y (north) of the centre on the
 * plane tangent to the sphere at the frame's origin, in radians; the angular radius theta, in radians; v0, the
 * systemic velocity, km/s; and ln w, w the expansion velocity in km/s. Two models carry two more:
 *   drifting    the centre's motion across the sky with velocity, radians per km/s along x and y
 *   elliptical  (e1, e2) = e (cos 2a, sin 2a) of a ring flattened along position angle a + 90 deg
 * A cap is the sphere with v0 held or under a prior.
 */
export type ModelName = 'sphere' | 'cap' | 'drifting' | 'elliptical';

export const X = 0;
export const Y = 1;
export const THETA = 2;
export const V0 = 3;
export const LN_W = 4;
export const EXTRA_1 = 5;
export const EXTRA_2 = 6;

const COMMON = ['l', 'b', 'theta', 'vSys', 'vExp'] as const;

/** Names of the parameters as a person reads them, in the order of the internal ones. */
export const PARAMETER_NAMES: Record<ModelName, readonly string[]> = {
  sphere: COMMON,
  cap: COMMON,
  drifting: [...COMMON, 'driftL', 'driftB'],
  elliptical: [...COMMON, 'axisRatio', 'positionAngle'],
};

/** Units of those parameters; the axis ratio has none. */
export const PARAMETER_UNITS: Record<string, string> = {
  l: 'deg',
  b: 'deg',
  theta: 'deg',
  vSys: 'km/s',
  vExp: 'km/s',
  driftL: 'deg/(km/s)',
  driftB: 'deg/(km/s)',
  axisRatio: '',
  positionAngle: 'deg',
};

export const parameterCount = (model: ModelName): number => PARAMETER_NAMES[model].length;
