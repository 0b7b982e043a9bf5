/** Reductions of one channel plane, over its unblanked pixels; null where there are none. */
export interface PlaneStatistics {
  min: number | null;
  max: number | null;
  mean: number | null;
  /** Root of the mean square about zero. */
  rms: number | null;
  /** 1.4826 times the median absolute deviation from the median: the noise of a Gaussian, deaf to bright pixels. */
  noise: number | null;
  /** Number of blank pixels. */
  blank: number;
}

/** 1 / (the upper quartile of a unit Gaussian), rounded as is usual. */
const GAUSSIAN_MAD = 1.4826;

/**
 * Minimum, maximum, mean, rms about zero, noise and number of blanks of a plane.
 *
 * Exact: the median of an even number of pixels is the mean of the two middle ones; sums are float64. Three passes, no
 * sort: 2 ms for 512 x 512 pixels.
 *
 * @param plane   brightness; NaN (and an infinity, should there be one) is blank
 * @param scratch at least as long as the plane; given, it is used instead of allocating
 */
export function planeStatistics(plane: Float32Array | Float64Array, scratch?: Float64Array): PlaneStatistics {
  const { min, max, mean, rms, noise, blank } = channelStatistics(plane, scratch);
  return { min, max, mean, rms, noise, blank };
}

/** The same with the median, of which the noise makes use; null where there are no pixels. */
export function channelStatistics(
  plane: Float32Array | Float64Array,
  scratch: Float64Array = new Float64Array(plane.length),
): PlaneStatistics & { median: number | null } {
  let n = 0;
  let numbers = 0;
  let min = Infinity;
  let max = -Infinity;
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < plane.length; i++) {
    const v = plane[i]!;
    const finite = v - v === 0 ? v : 0;
    n += Number(v - v === 0);
    numbers += Number(v === v);
    sum += finite;
    squares += finite * finite;
  }
  if (numbers > n) return channelStatistics(plane.map(withoutInfinity), scratch);
  // a loop of its own: together they take half as long again
  for (let i = 0; i < plane.length; i++) {
    const v = plane[i]!;
    if (v < min) min = v;
    if (v > max) max = v;
  }
  const blank = plane.length - n;
  if (n === 0) return { min: null, max: null, mean: null, rms: null, noise: null, blank, median: null };
  const median = planeMedian(plane, n, scratch);
  const noise = GAUSSIAN_MAD * planeDeviation(plane, n, median, scratch);
  return { min, max, mean: sum / n, rms: Math.sqrt(squares / n), noise, blank, median };
}

const withoutInfinity = (v: number) => (v - v === 0 ? v : NaN);

/** Median of the n pixels that are not NaN; none is infinite. */
function planeMedian(plane: Float32Array | Float64Array, n: number, scratch: Float64Array): number {
  const [low, high] = likelyMiddle(plane, n, 0, false, scratch);
  let below = 0;
  let found = 0;
  for (let i = 0; i < plane.length; i++) {
    const v = plane[i]!;
    // without branches, which no processor could predict; a NaN fails every comparison
    below += Number(v < low);
    scratch[found] = v;
    found += Number(v >= low) & Number(v <= high);
  }
  const known = middleOf(scratch, found, n, below);
  if (known !== null) return known;
  let m = 0;
  for (let i = 0; i < plane.length; i++) if (plane[i] === plane[i]) scratch[m++] = plane[i]!;
  return medianOf(scratch, m);
}

/** Median of the distances of the n pixels that are not NaN from a value. */
function planeDeviation(
  plane: Float32Array | Float64Array,
  n: number,
  from: number,
  scratch: Float64Array,
): number {
  const [low, high] = likelyMiddle(plane, n, from, true, scratch);
  let below = 0;
  let found = 0;
  for (let i = 0; i < plane.length; i++) {
    const v = Math.abs(plane[i]! - from);
    below += Number(v < low);
    scratch[found] = v;
    found += Number(v >= low) & Number(v <= high);
  }
  const known = middleOf(scratch, found, n, below);
  if (known !== null) return known;
  let m = 0;
  for (let i = 0; i < plane.length; i++) {
    const v = Math.abs(plane[i]! - from);
    if (v === v) scratch[m++] = v;
  }
  return medianOf(scratch, m);
}

/** Pixels in a sample, and how far from its middle the bounds are set: some four standard errors of a median. */
const SAMPLE = 4096;
const MARGIN = 0.035;
/** Multiples of the golden ratio spread evenly over the plane without following its rows. */
const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * Bounds between which the median very probably lies, from a sample of the plane; of a small plane no bounds. Should
 * they be wrong, the selection falls back on all pixels: the answer is exact either way.
 */
function likelyMiddle(
  plane: Float32Array | Float64Array,
  n: number,
  from: number,
  isDistance: boolean,
  scratch: Float64Array,
): [number, number] {
  if (n < 4 * SAMPLE) return [-Infinity, Infinity];
  let m = 0;
  for (let k = 0; k < SAMPLE; k++) {
    const v = plane[Math.floor(((k * GOLDEN) % 1) * plane.length)]!;
    if (v - v === 0) scratch[m++] = isDistance ? Math.abs(v - from) : v;
  }
  if (m < SAMPLE / 8) return [-Infinity, Infinity];
  const margin = MARGIN * Math.sqrt(SAMPLE / m);
  const low = select(scratch, 0, m - 1, Math.max(0, Math.floor((0.5 - margin) * m)));
  return [low, select(scratch, 0, m - 1, Math.min(m - 1, Math.ceil((0.5 + margin) * m)))];
}

/** Median of n values of which `below` are smaller than all of the first `found` and the rest larger; null: not here. */
function middleOf(values: Float64Array, found: number, n: number, below: number): number | null {
  const upper = (n >> 1) - below;
  const lower = ((n - 1) >> 1) - below;
  if (lower < 0 || upper >= found) return null;
  const high = select(values, 0, found - 1, upper);
  if (lower === upper) return high;
  let low = -Infinity;
  for (let i = 0; i < upper; i++) if (values[i]! > low) low = values[i]!;
  return (low + high) / 2;
}

/**
 * Median of the first n values, which are reordered. None may be NaN.
 *
 * @returns the middle value, or the mean of the two middle ones; NaN when n is 0
 */
export function medianOf(values: Float64Array, n: number): number {
  if (n === 0) return NaN;
  const middle = n >> 1;
  const upper = select(values, 0, n - 1, middle);
  if (n % 2 === 1) return upper;
  let lower = -Infinity; // the largest of the smaller half, which selection has put before the middle
  for (let i = 0; i < middle; i++) if (values[i]! > lower) lower = values[i]!;
  return (lower + upper) / 2;
}

/**
 * The k-th smallest (from 0) of values left … right, by partition about a sampled pivot (Floyd & Rivest 1975, Comm.
 * ACM 18, 165). Afterwards values before k are not larger and those after it not smaller.
 */
function select(values: Float64Array, leftmost: number, rightmost: number, k: number): number {
  let left = leftmost;
  let right = rightmost;
  while (right > left) {
    if (right - left > 600) {
      // Put at k a value that is very probably near the wanted one, by selecting in a sample around it.
      const size = right - left + 1;
      const z = Math.log(size);
      const s = 0.5 * Math.exp((2 * z) / 3);
      const spread = 0.5 * Math.sqrt((z * s * (size - s)) / size) * Math.sign(k - left - size / 2);
      const from = Math.max(left, Math.floor(k - ((k - left) * s) / size + spread));
      const to = Math.min(right, Math.floor(k + ((right - k) * s) / size + spread));
      select(values, from, to, k);
    }
    const pivot = values[k]!;
    let i = left;
    let j = right;
    while (i <= j) {
      while (values[i]! < pivot) i++;
      while (values[j]! > pivot) j--;
      if (i <= j) {
        const held = values[i]!;
        values[i++] = values[j]!;
        values[j--] = held;
      }
    }
    if (j < k) left = i;
    if (k < i) right = j;
  }
  return values[k]!;
}
