import { brightnessOf, type Quantised } from '@/shared/image/quantise';

/**
 * The brightness window that leaves the faintest and the brightest part of a plane out, in equal shares.
 *
 * @param share what stays inside, 0 … 1 (0.99 leaves half a hundredth out at each end); 1 is minimum to maximum
 * @returns null for a plane without numbers. Places are exact to one step of the plane's scale.
 */
export function windowOf(q: Quantised, share: number): [number, number] | null {
  const histogram = new Uint32Array(65536);
  for (let i = 0; i < q.values.length; i++) histogram[q.values[i]!]!++;
  const filled = q.values.length - histogram[q.blank]!;
  if (filled === 0) return null;
  const left = Math.floor(((1 - share) / 2) * (filled - 1));
  let low = -1;
  let high = 0;
  let seen = 0;
  for (let n = 0; n < 65536; n++) {
    if (n === q.blank || histogram[n] === 0) continue;
    seen += histogram[n]!;
    if (low < 0 && seen > left) low = n;
    if (seen >= filled - left) {
      high = n;
      break;
    }
  }
  const [from, to] = [brightnessOf(low, q), brightnessOf(high, q)];
  return from < to ? [from, to] : [from, from + q.scale];
}
