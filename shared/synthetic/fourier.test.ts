import { seededRandom } from '@/shared/random';
import { inverseFourier, powerOfTwo } from './fourier';

const random = seededRandom(3);
const noise = (n: number) => Float64Array.from({ length: n }, () => random.normal());

/** The sum written out. */
function direct(shape: number[], re: Float64Array, im: Float64Array) {
  const [nx, ny = 1, nz = 1] = shape as [number, number?, number?];
  const out = { re: new Float64Array(re.length), im: new Float64Array(re.length) };
  const places = Array.from({ length: re.length }, (_, i) => [
    i % nx,
    Math.floor(i / nx) % ny,
    Math.floor(i / nx / ny),
  ]);
  places.forEach(([x, y, z], at) =>
    places.forEach(([i, j, k], from) => {
      const angle = 2 * Math.PI * ((x! * i!) / nx + (y! * j!) / ny + (z! * k!) / nz);
      out.re[at]! += re[from]! * Math.cos(angle) - im[from]! * Math.sin(angle);
      out.im[at]! += re[from]! * Math.sin(angle) + im[from]! * Math.cos(angle);
    }),
  );
  return out;
}

test.each([[[1]], [[2]], [[32]], [[8, 4]], [[4, 8, 16]], [[16, 2, 1]]])(
  '%j is the sum written out',
  (shape) => {
    const n = shape.reduce((a, b) => a * b, 1);
    const [re, im] = [noise(n), noise(n)];
    const expected = direct(shape, re, im);
    inverseFourier({ shape, re, im });
    for (let i = 0; i < n; i++) {
      expect(re[i]).toBeCloseTo(expected.re[i]!, 10);
      expect(im[i]).toBeCloseTo(expected.im[i]!, 10);
    }
  },
);

test('the sum of squares grows by the number of elements', () => {
  const shape = [64, 32, 16];
  const [re, im] = [noise(32768), noise(32768)];
  const power = () => re.reduce((sum, x, i) => sum + x * x + im[i]! * im[i]!, 0);
  const before = power();
  inverseFourier({ shape, re, im });
  expect(power() / before / 32768).toBeCloseTo(1, 12);
});

test('refuses an axis that is no power of two and arrays of another length', () => {
  expect(() => inverseFourier({ shape: [6], re: noise(6), im: noise(6) })).toThrow(/no power of two/);
  expect(() => inverseFourier({ shape: [8], re: noise(8), im: noise(4) })).toThrow(/do not fill 8/);
});

test.each([
  [1, 1],
  [2, 2],
  [3, 4],
  [128, 128],
  [129, 256],
])('%i is padded to %i', (n, to) => {
  expect(powerOfTwo(n)).toBe(to);
});
