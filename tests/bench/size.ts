import { closeSync, ftruncateSync, openSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import { cubeFile } from '../api/cubeFile';
import { load } from './machine';
import { startBenchProduct } from './product';
import { seconds, table, verdict } from './table';

const LIMIT = 500e6;
const CUBES: {
  name: string;
  nx: number;
  ny: number;
  channels: number;
  size: number;
  cards: Record<string, number>;
}[] = [
  { name: '1024 x 1024 x 512 float32, 2 GiB', nx: 1024, ny: 1024, channels: 512, cards: {}, size: 4 },
  {
    name: '2000 x 1000 x 1000 int16, 2e9 pixels',
    ...{ nx: 2000, ny: 1000, channels: 1000, size: 2 },
    cards: { BITPIX: 16, BSCALE: 0.001, BZERO: 0 },
  },
];

/** Cubes larger than the memory that reading them may take, as files with holes: every pixel is zero. */
export async function benchSize(): Promise<void> {
  const rows = [['', 'whole ingest', "worker's peak", '', 'load']];
  for (const { name, nx, ny, channels, cards, size } of CUBES) {
    const product = await startBenchProduct();
    try {
      const path = join(product.scratch, 'large.fits');
      const shape = { NAXIS1: nx, NAXIS2: ny, NAXIS3: channels };
      const one = cubeFile({ nx: 1, ny: 1, channels: 1, cards: { ...cards, ...shape } });
      const header = one.subarray(0, one.length - 2880);
      const file = openSync(path, 'w');
      writeSync(file, header);
      ftruncateSync(file, header.length + Math.ceil((nx * ny * channels * size) / 2880) * 2880);
      closeSync(file);
      const { readySeconds } = await product.ingestFile(path);
      const peak = product.workerPeakBytes();
      rows.push([name, seconds(readySeconds), `${(peak / 1e6).toFixed(0)} MB`, verdict(peak, LIMIT), load()]);
    } finally {
      await product.stop();
    }
  }
  console.log(table(rows));
}
