import { execFileSync } from 'node:child_process';
import { join } from 'node:path';
import { seededRandom } from '@/shared/random';
import { cookieOf } from '../api/uploading';
import { load } from './machine';
import { startBenchProduct } from './product';
import { ORDERS, SIDE, writeIngestCube } from './ingestCubes';
import { median, milliseconds, quantile, table, verdict } from './table';

const TIMES = 200;
const WARM = 50;
const LIMIT = { plane: 40, cut: 80 };

/** Random channels at full size, random cuts and random spectra of 512 x 512 x 512 pixels, one after the other. */
export async function benchPlanes(): Promise<void> {
  const product = await startBenchProduct();
  try {
    const rows = [['server side', 'median', '95th of 200', 'slowest', '', 'limit', 'load']];
    for (const order of ORDERS) {
      const file = join(product.scratch, `${order}.fits`);
      writeIngestCube(file, order);
      const { cubeId } = await product.ingestFile(file);
      execFileSync('sync'); // what ingest wrote is on the disk before anything is timed
      const headers = { Cookie: cookieOf(product.lead, product.url) };
      const take = async (path: string) => {
        const answer = await fetch(`${product.url}/api/v1/cubes/${cubeId}/${path}`, { headers });
        const bytes = await answer.arrayBuffer();
        if (!answer.ok) throw new Error(`${path}: ${answer.status} ${Buffer.from(bytes).toString()}`);
        return Number(/total;dur=([\d.]+)/.exec(answer.headers.get('Server-Timing') ?? '')?.[1]);
      };
      const random = seededRandom(7);
      const upTo = (n: number) => Math.floor(random.uniform() * n);
      const place = () => `${(120 + 25 * (random.uniform() - 0.5)).toFixed(4)}`;
      const height = () => `${(25 * (random.uniform() - 0.5)).toFixed(4)}`;
      const asked: [string, number, () => string][] = [
        ['planes', LIMIT.plane, () => `channels/${upTo(SIDE)}/plane`],
        ['cuts', LIMIT.cut, () => `cut?l=${place()}&b=${height()}&toL=${place()}&toB=${height()}`],
        ['rings', LIMIT.cut, () => `cut?l=120&b=0&radius=${(1 + 11 * random.uniform()).toFixed(3)}`],
        ['spectra', LIMIT.plane, () => `spectrum?x=${upTo(SIDE)}&y=${upTo(SIDE)}&radius=5`],
      ];
      for (const [name, limit, path] of asked) {
        for (let i = 0; i < WARM; i++) await take(path()); // the first requests compile the code
        const times: number[] = [];
        for (let i = 0; i < TIMES; i++) times.push(await take(path()));
        const p95 = quantile(times, 0.95);
        rows.push([
          ...[
            `${order}, ${name}`,
            milliseconds(median(times)),
            milliseconds(p95),
            milliseconds(Math.max(...times)),
          ],
          ...[verdict(p95, limit), `${limit} ms`, load()],
        ]);
      }
    }
    console.log(table(rows));
    console.log('\nfrom the request until its answer is written, sign-in and permission included');
  } finally {
    await product.stop();
  }
}
