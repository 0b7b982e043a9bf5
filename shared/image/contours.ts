import type { ImagePoint } from '@/shared/image/viewport';

/** Lines of one brightness, in pixels of the plane; closed ones end where they began. */
export interface Contour {
  level: number;
  lines: ImagePoint[][];
}

/** For each of the 16 ways in which four corners lie above a level: the sides that are joined, two by two. */
// prettier-ignore
const SIDES: readonly (readonly number[])[] = [
  [], [3, 0], [0, 1], [3, 1], [1, 2], [3, 0, 1, 2], [0, 2], [3, 2],
  [2, 3], [2, 0], [0, 1, 2, 3], [2, 1], [1, 3], [1, 0], [0, 3], [],
];

/**
 * Contours by marching squares: between pixel centres brightness is taken to be linear along the sides of a cell; a
 * cell with a blank corner has no line, so contours end at blanks and at the edge instead of following them. Where a
 * cell is a saddle its two lines are parted by the mean of its corners.
 *
 * @param plane length nx·ny, row y = 0 first
 */
export function contoursOf(
  plane: Float32Array,
  nx: number,
  ny: number,
  levels: readonly number[],
): Contour[] {
  if (plane.length !== nx * ny)
    throw new RangeError(`${plane.length} numbers cannot be ${nx} by ${ny} pixels`);
  return levels.map((level) => ({ level, lines: linesAt(plane, nx, ny, level) }));
}

function linesAt(plane: Float32Array, nx: number, ny: number, level: number): ImagePoint[][] {
  // A crossing is named by its side of a cell: sides along x have even names, sides along y odd ones.
  const joined = new Map<number, number[]>();
  const join = (a: number, b: number) => {
    for (const [from, to] of [
      [a, b],
      [b, a],
    ] as const) {
      const ends = joined.get(from);
      if (ends) ends.push(to);
      else joined.set(from, [to]);
    }
  };
  for (let j = 0; j + 1 < ny; j++)
    for (let i = 0; i + 1 < nx; i++) {
      const at = j * nx + i;
      const corners = [plane[at]!, plane[at + 1]!, plane[at + nx + 1]!, plane[at + nx]!] as const;
      const mean = (corners[0] + corners[1] + corners[2] + corners[3]) / 4;
      if (mean - mean !== 0) continue;
      let kind = 0;
      corners.forEach((value, c) => (kind |= value >= level ? 1 << c : 0));
      if ((kind === 5 || kind === 10) && mean >= level) kind = 15 - kind; // the ridge runs through: part the lines so
      const names = [2 * at, 2 * (at + 1) + 1, 2 * (at + nx), 2 * at + 1];
      const sides = SIDES[kind]!;
      for (let s = 0; s < sides.length; s += 2) join(names[sides[s]!]!, names[sides[s + 1]!]!);
    }
  const point = (name: number): ImagePoint => {
    const at = name >> 1;
    const [x, y] = [at % nx, Math.floor(at / nx)];
    const step = name & 1 ? nx : 1;
    const share = (level - plane[at]!) / (plane[at + step]! - plane[at]!);
    return name & 1 ? { x, y: y + share } : { x: x + share, y };
  };
  const lines: ImagePoint[][] = [];
  const follow = (start: number) => {
    const line = [point(start)];
    for (let here = start; ;) {
      const next = joined.get(here)?.pop();
      if (next === undefined) break;
      const back = joined.get(next)!;
      back.splice(back.indexOf(here), 1);
      line.push(point(next));
      here = next;
    }
    if (line.length > 1) lines.push(line);
  };
  for (const [name, ends] of joined) if (ends.length === 1) follow(name); // open lines from their ends
  for (const name of joined.keys()) if (joined.get(name)!.length > 0) follow(name);
  return lines;
}
