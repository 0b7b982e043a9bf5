/** IAU 2012 astronomical unit × 648000/π: metres in a parsec, here in kilometres. */
export const PARSEC_KM = 3.0856775814913673e13;

/** Seconds in 10⁶ Julian years of 365.25 days. */
export const MEGAYEAR_S = 3.15576e13;
