import { execFile } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { numpyPython } from './machine';

/** What upload_numpy.py found. */
export interface NumpyReduction {
  seconds: number;
  peakBytes: number;
  /** Minimum, maximum, mean, rms, noise, blanks of each channel. */
  stats: (number | null)[][];
  spectrum: (number | null)[];
  window: [number, number];
  /** Width and height. */
  thumbnail: [number, number];
  total: Float64Array;
  /** Grey levels of all thumbnails, one after the other, top row first. */
  levels: Uint8Array;
}

export async function numpyReduction(
  cube: string,
  folder: string,
  processes: number,
): Promise<NumpyReduction> {
  const script = join(__dirname, 'upload_numpy.py');
  // one thread for each process: the reductions call no library that would use more
  const env = { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' };
  const { program } = numpyPython()!;
  const { stdout } = await promisify(execFile)(program, [script, cube, folder, String(processes)], {
    env,
    maxBuffer: 2 ** 24,
  });
  const total = readFileSync(join(folder, 'total.f8'));
  return {
    ...(JSON.parse(stdout) as Omit<NumpyReduction, 'total' | 'levels'>),
    total: new Float64Array(total.buffer.slice(total.byteOffset, total.byteOffset + total.byteLength)),
    levels: readFileSync(join(folder, 'thumbnails.u1')),
  };
}
