/** A density on a square grid over [0, 1]²; row-major from the lower left. */
export interface Density {
  size: number;
  value: Float64Array;
}
export interface UnitPoint {
  x: number;
  y: number;
}

/**
 * Gaussian kernel density of points in the unit square, with Scott's width along each axis; not normalised.
 *
 * @param points coordinates 0 to 1; those outside count where their kernel reaches in
 * @param size   grid points along a side
 */
export function densityOf(points: readonly UnitPoint[], size = 48): Density {
  const value = new Float64Array(size * size);
  const [wx, wy] = [width(points.map((p) => p.x)), width(points.map((p) => p.y))];
  const kernel = (centre: number, w: number) =>
    Float64Array.from({ length: size }, (_, i) => Math.exp(-0.5 * ((i / (size - 1) - centre) / w) ** 2));
  for (const point of points) {
    const [kx, ky] = [kernel(point.x, wx), kernel(point.y, wy)];
    for (let j = 0; j < size; j++) for (let i = 0; i < size; i++) value[j * size + i]! += kx[i]! * ky[j]!;
  }
  return { size, value };
}

/** n^(−1/6) standard deviations, at least a grid step so that a line of points has a width. Source: Scott 1992. */
function width(x: readonly number[]): number {
  const mean = x.reduce((a, b) => a + b, 0) / x.length;
  const sd = Math.sqrt(x.reduce((a, b) => a + (b - mean) ** 2, 0) / x.length);
  return Math.max(sd * x.length ** (-1 / 6), 0.02);
}

/** The density at a place, linear between grid points. */
export function densityAt({ size, value }: Density, { x, y }: UnitPoint): number {
  const along = (t: number) => Math.min(Math.max(t, 0), 1) * (size - 1);
  const [gx, gy] = [along(x), along(y)];
  const [i, j] = [Math.min(Math.floor(gx), size - 2), Math.min(Math.floor(gy), size - 2)];
  const [u, v] = [gx - i, gy - j];
  const at = (a: number, b: number) => value[b * size + a]!;
  return (
    (1 - v) * ((1 - u) * at(i, j) + u * at(i + 1, j)) + v * ((1 - u) * at(i, j + 1) + u * at(i + 1, j + 1))
  );
}

/** The density above which this share of the points lies: the level of the contour that holds them. */
export function levelHolding(density: Density, points: readonly UnitPoint[], share: number): number {
  const heights = points.map((p) => densityAt(density, p)).sort((a, b) => b - a);
  return heights[Math.min(Math.round(share * heights.length), heights.length) - 1] ?? Infinity;
}

type Segment = [UnitPoint, UnitPoint];

/** Line segments of a contour, by marching squares; saddles are cut by the mean of their corners. */
export function contour({ size, value }: Density, level: number): Segment[] {
  const segments: Segment[] = [];
  const step = 1 / (size - 1);
  for (let j = 0; j < size - 1; j++)
    for (let i = 0; i < size - 1; i++) {
      const corner = [
        value[j * size + i]!,
        value[j * size + i + 1]!,
        value[(j + 1) * size + i + 1]!,
        value[(j + 1) * size + i]!,
      ];
      // crossings of the four edges, counter-clockwise from the lower one
      const crossing = corner.map((from, e): UnitPoint | null => {
        const to = corner[(e + 1) % 4]!;
        if (from >= level === to >= level) return null;
        const t = (level - from) / (to - from);
        const [x, y] = [
          [t, 0],
          [1, t],
          [1 - t, 1],
          [0, 1 - t],
        ][e]!;
        return { x: (i + x!) * step, y: (j + y!) * step };
      });
      const found = crossing.filter((c) => c !== null);
      if (found.length === 2) segments.push([found[0]!, found[1]!]);
      else if (found.length === 4) {
        const high = corner.reduce((a, b) => a + b, 0) / 4 >= level;
        const [lower, right, upper, left] = crossing as UnitPoint[];
        // a high middle joins the high corners, and so cuts off the low ones
        if (high === corner[0]! >= level) segments.push([lower!, right!], [upper!, left!]);
        else segments.push([left!, lower!], [right!, upper!]);
      }
    }
  return segments;
}

/** Counts of values in bins of equal width between two ends; what lies outside is left out. */
export function histogram(
  values: readonly number[],
  [low, high]: readonly [number, number],
  bins: number,
): number[] {
  const counts = Array.from({ length: bins }, () => 0);
  for (const v of values) {
    const k = Math.floor(((v - low) / (high - low)) * bins);
    if (k >= 0 && k < bins) counts[k]!++;
    else if (v === high) counts[bins - 1]!++;
  }
  return counts;
}
