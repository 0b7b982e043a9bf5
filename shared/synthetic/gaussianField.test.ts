import { seededRandom } from '@/shared/random';
import { gaussianFields } from './gaussianField';

/** Mean squared difference between neighbours `lag` apart along x or along z. */
function structure(
  field: Float32Array,
  [nx, ny, nz]: [number, number, number],
  lag: number,
  along: 'x' | 'z',
) {
  let [sum, n] = [0, 0];
  const step = along === 'x' ? lag : lag * nx * ny;
  for (let k = 0; k < nz - (along === 'z' ? lag : 0); k++)
    for (let j = 0; j < ny; j++)
      for (let i = 0; i < nx - (along === 'x' ? lag : 0); i++, n++) {
        const at = i + nx * (j + ny * k);
        sum += (field[at + step]! - field[at]!) ** 2;
      }
  return sum / n;
}

test('has mean 0 and variance 1, and its two fields are not alike', () => {
  const [a, b] = gaussianFields({ shape: [100, 60, 20], slope: -2.5 }, seededRandom(1));
  const mean = (f: (i: number) => number) => a.reduce((sum, _, i) => sum + f(i), 0) / a.length;
  expect(a).toHaveLength(120_000);
  expect(mean((i) => a[i]!)).toBeCloseTo(0, 5);
  expect(mean((i) => a[i]! ** 2)).toBeCloseTo(1, 5);
  expect(Math.abs(mean((i) => a[i]! * b[i]!))).toBeLessThan(0.2);
});

test('is normally distributed', () => {
  const [a] = gaussianFields({ shape: [128, 128], slope: -1 }, seededRandom(5));
  const within = (s: number) => a.filter((x) => Math.abs(x) < s).length / a.length;
  expect(within(1)).toBeCloseTo(0.683, 1);
  expect(within(2)).toBeCloseTo(0.954, 1);
});

// In three dimensions a power spectrum k^-n gives mean squared differences that grow as lag^(n - 3), 3 < n < 5.
test.each([[-3.4], [-4]])('differences grow with distance as slope %f asks', (slope) => {
  const shape: [number, number, number] = [64, 64, 64];
  const ratios = [1, 2, 3, 4].map((seed) => {
    const [a] = gaussianFields({ shape, slope }, seededRandom(seed));
    return structure(a, shape, 8, 'x') / structure(a, shape, 4, 'x');
  });
  const growth = Math.log2(ratios.reduce((a, b) => a + b) / ratios.length);
  expect(Math.abs(growth - (-slope - 3))).toBeLessThan(0.25);
});

test('a stretched axis changes as slowly as the stretch says', () => {
  const shape: [number, number, number] = [64, 64, 64];
  const [a] = gaussianFields({ shape, slope: -3.5, stretch: [1, 1, 4] }, seededRandom(2));
  expect(structure(a, shape, 8, 'z') / structure(a, shape, 2, 'x')).toBeCloseTo(1, 0);
  expect(structure(a, shape, 2, 'z')).toBeLessThan(0.6 * structure(a, shape, 2, 'x'));
});

test('the same seed gives the same field to the last bit, another one another', () => {
  const make = (seed: number) => gaussianFields({ shape: [32, 16], slope: -3 }, seededRandom(seed))[0];
  expect(make(7)).toEqual(make(7));
  expect(make(7)).not.toEqual(make(8));
});
