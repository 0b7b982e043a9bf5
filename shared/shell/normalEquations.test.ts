import { accumulate, factorise, hold, invert, substitute } from '@/shared/shell/normalEquations';

const A = Float64Array.of(4, 2, 0.4, 2, 10, 1, 0.4, 1, 3);

test('a factorised matrix solves its equations', () => {
  const L = Float64Array.from(A);
  const b = Float64Array.of(1, 2, 3);
  expect(factorise(3, L)).toBe(true);
  substitute(3, L, b);
  for (let a = 0; a < 3; a++) {
    const sum = A[3 * a]! * b[0]! + A[3 * a + 1]! * b[1]! + A[3 * a + 2]! * b[2]!;
    expect(sum).toBeCloseTo(a + 1, 14);
  }
});

test('an inverse survives units sixteen decades apart', () => {
  const scale = [1e-8, 1, 1e8];
  const B = A.map((v, at) => v * scale[Math.floor(at / 3)]! * scale[at % 3]!);
  const inverse = invert(3, B)!;
  for (let a = 0; a < 3; a++)
    for (let b = 0; b < 3; b++) {
      let sum = 0;
      for (let c = 0; c < 3; c++) sum += B[3 * a + c]! * inverse[3 * c + b]!;
      expect(Math.abs(sum * (scale[b]! / scale[a]!) - (a === b ? 1 : 0))).toBeLessThan(1e-13);
    }
});

test('a singular matrix has no inverse and no factor', () => {
  const singular = Float64Array.of(1, 1, 1, 1);
  expect(invert(2, singular)).toBeNull();
  expect(factorise(2, Float64Array.of(1, 2, 2, 1))).toBe(false);
});

test('normal equations of a line through points, and a held parameter', () => {
  const J = Float64Array.of(1, 0, 1, 1, 1, 2);
  const B = new Float64Array(4);
  const g = new Float64Array(2);
  const cost = accumulate(2, Float64Array.of(1, -1, 2), J, Float64Array.of(1, 2, 1), B, g);
  expect(cost).toBe(7);
  expect([...B]).toEqual([4, 4, 4, 6]);
  expect([...g]).toEqual([1, 2]);
  hold(2, 1, B, g);
  expect([...B, ...g]).toEqual([4, 0, 0, 1, 1, 0]);
});

test('five parameters, summed in registers, as any number of them', () => {
  const value = (i: number) => Math.sin(1 + 7 * i);
  const n = 9;
  const five = Float64Array.from({ length: 5 * n }, (_, i) => value(i));
  const six = Float64Array.from({ length: 6 * n }, (_, i) =>
    i % 6 === 5 ? 0 : five[5 * Math.floor(i / 6) + (i % 6)]!,
  );
  const residual = Float64Array.from({ length: n }, (_, i) => value(100 + i));
  const weight = Float64Array.from({ length: n }, (_, i) => 1 + value(200 + i) ** 2);
  const [B, g, C, h] = [25, 5, 36, 6].map((size) => new Float64Array(size)) as [
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
  ];
  expect(accumulate(5, residual, five, weight, B, g)).toBe(accumulate(6, residual, six, weight, C, h));
  for (let a = 0; a < 5; a++) {
    expect(g[a]).toBe(h[a]);
    for (let b = 0; b < 5; b++) expect(B[5 * a + b]).toBe(C[6 * a + b]);
  }
});
