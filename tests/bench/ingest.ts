import { execFile } from 'node:child_process';
import { copyFileSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { promisify } from 'node:util';
import type { Channel, Cube } from '@/shared/contract/cubes';
import { cookieOf } from '../api/uploading';
import { load, numpyPython } from './machine';
import { numericPass } from './numericPass';
import { startBenchProduct, type BenchProduct } from './product';
import { ORDERS, writeIngestCube } from './ingestCubes';
import { median, seconds, table, verdict } from './table';

const ROUNDS = 3;
const LIMIT = { numeric: 0.7, whole: 1.5, bytes: 500e6 };

interface Numpy {
  seconds: number;
  peakBytes: number;
  stats: number[][];
  noise: number;
}

/** Cubes of 512 x 512 x 512 pixels beside numpy on one thread, turn and turn about, from a warm file. */
export async function benchIngest(): Promise<void> {
  const product = await startBenchProduct();
  try {
    const rows = [
      ['512 x 512 x 512', 'numpy', 'numeric pass', 'ratio', '', 'whole ingest', 'ratio', '', 'load'],
    ];
    const checks: string[][] = [['', ...COLUMNS]];
    for (const order of ORDERS) {
      const file = join(product.scratch, `${order}.fits`);
      writeIngestCube(file, order);
      const [theirs, pass, whole]: number[][] = [[], [], []];
      for (let round = 0; round < ROUNDS; round++) {
        const numpy = await numpyOf(file, product.scratch);
        theirs!.push(numpy.seconds);
        pass!.push(await numericPass(file, join(product.scratch, 'pass')));
        const copy = join(product.scratch, 'files', `${order}.fits`);
        copyFileSync(file, copy);
        const { cubeId, readySeconds } = await product.ingestFile(copy);
        whole!.push(readySeconds);
        if (round === 0) checks.push([order, ...(await compare(product, cubeId, numpy))]);
      }
      const [n, p, w] = [theirs, pass, whole].map((times) => median(times!)) as [number, number, number];
      rows.push([
        ...[order, seconds(n), seconds(p), (p / n).toFixed(2), verdict(p / n, LIMIT.numeric)],
        ...[seconds(w), (w / n).toFixed(2), verdict(w / n, LIMIT.whole), load()],
      ]);
    }
    console.log(table(rows));
    console.log(
      `\nmedians of ${ROUNDS}; limits ${LIMIT.numeric} and ${LIMIT.whole} times numpy, which has one thread`,
    );
    const peak = product.workerPeakBytes();
    console.log(
      `${verdict(peak, LIMIT.bytes)} worker's peak ${(peak / 1e6).toFixed(0)} MB, all threads, over all cubes`,
    );
    console.log('\nLargest difference from numpy, in units of the noise:\n');
    console.log(table(checks));
  } finally {
    await product.stop();
  }
}

const COLUMNS = ['minimum', 'maximum', 'mean', 'median', 'rms', 'noise', 'blanks', 'noise of cube', 'maps'];

async function numpyOf(cube: string, folder: string): Promise<Numpy> {
  const env = { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' };
  const { stdout } = await promisify(execFile)(
    numpyPython()!.program,
    [join(__dirname, 'ingest_numpy.py'), cube, folder],
    { env, maxBuffer: 2 ** 26 },
  );
  return JSON.parse(stdout) as Numpy;
}

/** What was stored beside what numpy found. */
async function compare(
  { lead, url, scratch }: BenchProduct,
  cubeId: string,
  numpy: Numpy,
): Promise<string[]> {
  const cube = (await lead.get(`/cubes/${cubeId}`).expect(200)).body as Cube;
  const { items } = (await lead.get(`/cubes/${cubeId}/channels`).expect(200)).body as { items: Channel[] };
  const ours = items.map((c) => [c.minimum, c.maximum, c.mean, c.median, c.rmsAboutZero, c.rms, c.blanks]);
  const worst = COLUMNS.slice(0, 7).map((_, i) =>
    Math.max(...ours.map((row, k) => Math.abs(row[i]! - numpy.stats[k]![i]!) / numpy.noise)),
  );
  worst.push(Math.abs(cube.statistics!.rms! - numpy.noise) / numpy.noise);
  return [...worst.map((v) => v.toExponential(0)), await maps(url, cookieOf(lead, url), cubeId, scratch)];
}

/** Total and peak, to the step of the numbers they are sent in; velocity and dispersion where the masks agree. */
async function maps(url: string, Cookie: string, cubeId: string, scratch: string): Promise<string> {
  const bytes = readFileSync(join(scratch, 'maps.f8'));
  const all = new Float64Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length));
  const kinds = ['total', 'velocity', 'dispersion', 'peak'];
  const size = all.length / kinds.length;
  const found: string[] = [];
  for (const [i, kind] of kinds.entries()) {
    const answer = await fetch(`${url}/api/v1/cubes/${cubeId}/maps/${kind}`, { headers: { Cookie } });
    const [scale, offset, blank] = ['Scale', 'Offset', 'Blank'].map((n) =>
      Number(answer.headers.get(`Plane-${n}`)),
    );
    const stored = new Uint16Array(await answer.arrayBuffer());
    const off = Array.from(stored, (n, at) =>
      n === blank ? NaN : Math.abs(offset! + scale! * n - all[i * size + at]!) / scale!,
    ).filter((v) => !Number.isNaN(v));
    found.push(`${kind} ${median(off).toFixed(1)}`);
  }
  return `median off, steps of 1/65534: ${found.join(', ')}`;
}
