/** Arrays kept for the next request, and the most numbers that they hold together. */
const MOST_KEPT = 6;
const MOST_NUMBERS = 16 * 2 ** 20;

const kept: Float32Array[] = [];

/**
 * Lend an array of numbers while `work` goes on. Memory that is new costs the system more than the arithmetic on it,
 * so one that an earlier request has done with is lent again, with whatever it holds.
 */
export async function withFloats<T>(length: number, work: (floats: Float32Array) => Promise<T>): Promise<T> {
  const at = kept.findIndex((floats) => floats.length >= length && floats.length <= 4 * length);
  const floats = at < 0 ? new Float32Array(length) : kept.splice(at, 1)[0]!;
  try {
    return await work(floats.subarray(0, length));
  } finally {
    kept.push(floats);
    while (kept.length > MOST_KEPT || kept.reduce((sum, f) => sum + f.length, 0) > MOST_NUMBERS) kept.shift();
  }
}
