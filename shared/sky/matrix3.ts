import { DEGREE, type Vector } from './greatCircle';

/** A 3 x 3 matrix, row by row. */
export type Matrix3 = readonly [Vector, Vector, Vector];

export const apply = (m: Matrix3, v: Vector): Vector => [
  m[0][0] * v[0] + m[0][1] * v[1] + m[0][2] * v[2],
  m[1][0] * v[0] + m[1][1] * v[1] + m[1][2] * v[2],
  m[2][0] * v[0] + m[2][1] * v[1] + m[2][2] * v[2],
];

export const transpose = ([a, b, c]: Matrix3): Matrix3 => [
  [a[0], b[0], c[0]],
  [a[1], b[1], c[1]],
  [a[2], b[2], c[2]],
];

/** The product of matrices, leftmost first; the rightmost acts first. */
export function product(...matrices: Matrix3[]): Matrix3 {
  return matrices.reduceRight((right, left) => {
    const columns = transpose(right);
    return transpose([apply(left, columns[0]), apply(left, columns[1]), apply(left, columns[2])]);
  });
}

/** Rotation of the axes (not of the vector) about one axis by an angle in degrees: what a frame change does. */
export function axesTurned(axis: 'x' | 'y' | 'z', degrees: number): Matrix3 {
  const c = Math.cos(degrees * DEGREE);
  const s = Math.sin(degrees * DEGREE);
  if (axis === 'x') {
    return [
      [1, 0, 0],
      [0, c, s],
      [0, -s, c],
    ];
  }
  if (axis === 'y') {
    return [
      [c, 0, -s],
      [0, 1, 0],
      [s, 0, c],
    ];
  }
  return [
    [c, s, 0],
    [-s, c, 0],
    [0, 0, 1],
  ];
}
