/** Pixels that are taken for the beam where a header names none. */
export const PIXELS_A_BEAM = 3;
