import { seededRandom, xoshiro128 } from '@/shared/random';

test('xoshiro128** from the state 1, 2, 3, 4', () => {
  const next = xoshiro128(Uint32Array.of(1, 2, 3, 4));
  // Values of the authors' xoshiro128starstar.c, version 1.1.
  const published = [
    11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597, 4258142804,
  ];
  expect(published.map(() => next())).toEqual(published);
});

test('the same seed repeats itself; another does not', () => {
  const ten = (seed: number) => {
    const random = seededRandom(seed);
    return Array.from({ length: 10 }, () => [random.uniform(), random.normal(), random.chiSquare(3)]);
  };
  expect(ten(7)).toEqual(ten(7));
  expect(ten(7)).not.toEqual(ten(8));
  expect(new Set(ten(0).flat()).size).toBe(30);
});

/** Mean and variance within five of their own standard errors for this many draws. */
test.each([0.4, 1, 3, 17])('chi-square with %d degrees of freedom', (nu) => {
  const random = seededRandom(11);
  const n = 200_000;
  let [sum, square] = [0, 0];
  for (let i = 0; i < n; i++) {
    const x = random.chiSquare(nu);
    sum += x;
    square += (x - nu) ** 2;
  }
  expect(Math.abs(sum / n - nu)).toBeLessThan(5 * Math.sqrt((2 * nu) / n));
  expect(Math.abs(square / n - 2 * nu)).toBeLessThan(5 * Math.sqrt((48 * nu + 8 * nu * nu) / n));
});

test('normals and uniforms', () => {
  const random = seededRandom(5);
  const n = 200_000;
  const moments = [0, 0, 0, 0];
  let mean = 0;
  for (let i = 0; i < n; i++) {
    const x = random.normal();
    for (let k = 0; k < 4; k++) moments[k]! += x ** (k + 1) / n;
    mean += random.uniform() / n;
  }
  const allowed = [1, 2, 15, 96].map((variance) => 5 * Math.sqrt(variance / n));
  [0, 1, 0, 3].forEach((value, k) => expect(Math.abs(moments[k]! - value)).toBeLessThan(allowed[k]!));
  expect(Math.abs(mean - 0.5)).toBeLessThan(5 * Math.sqrt(1 / 12 / n));
});
