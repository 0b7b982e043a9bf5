/**
 * One map projection of the FITS standard: native longitude and latitude on one side, the projection plane on the
 * other, both in degrees (Calabretta & Greisen 2002, A&A 395, 1077, whose section 5 numbers the formulas).
 */
export interface Projection {
  /** Native latitude of the reference point: 90 for the zenithal projections, 0 for the others. */
  referenceLatitude: 0 | 90;
  /** Plane coordinates [X, Y] of native [phi, theta]; null where the projection cannot show the place. */
  forward(phi: number, theta: number): Pair | null;
  /** Native [phi, theta] of plane coordinates; null outside the map. */
  inverse(X: number, Y: number): Pair | null;
}

export type Pair = readonly [number, number];

/**
 * Makes a projection from its parameters.
 *
 * @param parameters PVi_m of the latitude axis by number m; null where the header gives none
 * @param latitude   CRVAL of the latitude axis, degrees (only old NCP needs it)
 * @throws WcsError for a parameter that makes no map
 */
export type ProjectionMaker = (parameters: readonly (number | null)[], latitude: number) => Projection;
