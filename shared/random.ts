/** Random numbers from one seed, the same on every run: a generator and the distributions that are drawn from it. */
export interface Random {
  /** Uniform in [0, 1), 32 bits. */
  uniform(): number;
  /** Standard normal. */
  normal(): number;
  /** Chi-square with nu > 0 degrees of freedom. */
  chiSquare(nu: number): number;
}

/**
 * xoshiro128** (Blackman & Vigna 2021): 32 random bits a call, period 2^128 - 1. The state, four words not all zero,
 * is changed in place.
 */
export function xoshiro128(state: Uint32Array): () => number {
  return () => {
    const [a, b, c, d] = [state[0]!, state[1]!, state[2]!, state[3]!];
    state[2] = c ^ a;
    state[3] = d ^ b;
    state[1] = b ^ state[2]!;
    state[0] = a ^ state[3]!;
    state[2] = state[2]! ^ (b << 9);
    state[3] = rotate(state[3]!, 11);
    return Math.imul(rotate(Math.imul(b, 5), 7), 9) >>> 0;
  };
}

/**
 * A generator from one seed, spread over its state by splitmix32. Normals by the polar method, chi-squares as gamma
 * deviates (Marsaglia & Tsang 2000).
 *
 * @param seed whole number, of which 32 bits count
 */
export function seededRandom(seed: number): Random {
  const state = new Uint32Array(4);
  let mixed = seed >>> 0;
  for (let i = 0; i < 4; i++) {
    mixed = (mixed + 0x9e3779b9) >>> 0;
    let z = mixed;
    z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
    z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
    state[i] = z ^ (z >>> 15);
  }
  let spare: number | null = null;

  const bits = xoshiro128(state);
  const uniform = () => bits() / 0x100000000;

  function normal(): number {
    if (spare !== null) {
      const value = spare;
      spare = null;
      return value;
    }
    for (;;) {
      const x = 2 * uniform() - 1;
      const y = 2 * uniform() - 1;
      const s = x * x + y * y;
      if (s >= 1 || s === 0) continue;
      const scale = Math.sqrt((-2 * Math.log(s)) / s);
      spare = y * scale;
      return x * scale;
    }
  }

  /** Gamma deviate of scale 1. Shapes below 1 are drawn one higher and brought down by a power of a uniform. */
  function gamma(shape: number): number {
    if (shape < 1) return gamma(shape + 1) * (1 - uniform()) ** (1 / shape);
    const d = shape - 1 / 3;
    const c = 1 / Math.sqrt(9 * d);
    for (;;) {
      const x = normal();
      const v = (1 + c * x) ** 3;
      if (v > 0 && Math.log(1 - uniform()) < 0.5 * x * x + d * (1 - v + Math.log(v))) return d * v;
    }
  }

  return { uniform, normal, chiSquare: (nu) => 2 * gamma(nu / 2) };
}

const rotate = (x: number, k: number) => (x << k) | (x >>> (32 - k));
