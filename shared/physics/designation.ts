/**
 * Designation of a Galactic shell in the trade's usual form, GSH lll±bb±vvv: longitude, latitude and central
 * velocity to whole degrees and km/s (Heiles 1979, ApJ 229, 533; rounding: common practice).
 *
 * @param l    degrees, any turn
 * @param b    degrees
 * @param vSys km/s
 */
export function designation(l: number, b: number, vSys: number): string {
  const turn = ((Math.round(l) % 360) + 360) % 360;
  const signed = (x: number, width: number) => {
    const n = Math.round(x);
    // a value that rounds to nought keeps the sign it had, so that b = −0.3 is not taken for the north
    const sign = n < 0 || (n === 0 && x < 0) ? '-' : '+';
    return sign + String(Math.abs(n)).padStart(width, '0');
  };
  return `GSH ${String(turn).padStart(3, '0')}${signed(b, 2)}${signed(vSys, 3)}`;
}
