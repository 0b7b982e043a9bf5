import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { agreements } from './agreement';
import { benchCube, NAME } from './benchCube';
import { load } from './machine';
import { numpyReduction, type NumpyReduction } from './numpyReduction';
import { startBenchProduct, type Ingested } from './product';
import { median, seconds, table, verdict } from './table';

const ROUNDS = 3;
const PROCESSES = [1, 2];
const LIMIT = { seconds: 20, bytes: 600e6 };

/** Upload and ingest beside numpy's reductions of the same file, turn and turn about in one run. */
export async function benchUpload(): Promise<void> {
  const bytes = benchCube();
  const product = await startBenchProduct();
  try {
    const file = join(product.scratch, 'bench.fits');
    writeFileSync(file, bytes);
    const ours: Ingested[] = [];
    const theirs = PROCESSES.map(() => [] as NumpyReduction[]);
    const rows = [['round', 'upload', 'queued to ready', ...PROCESSES.map(numpyName), 'load']];
    for (let round = 1; round <= ROUNDS; round++) {
      ours.push(await product.ingest(bytes));
      for (const [i, processes] of PROCESSES.entries())
        theirs[i]!.push(await numpyReduction(file, product.scratch, processes));
      const last = ours.at(-1)!;
      const numpy = theirs.map((runs) => seconds(runs.at(-1)!.seconds));
      rows.push([`${round}`, seconds(last.uploadSeconds), seconds(last.readySeconds), ...numpy, load()]);
    }
    const ready = median(ours.map((o) => o.readySeconds));
    const times = theirs.map((runs) => median(runs.map((r) => r.seconds)));
    const upload = median(ours.map((o) => o.uploadSeconds));
    rows.push(['median', seconds(upload), seconds(ready), ...times.map(seconds), '']);
    rows.push(['ours / numpy', '', '', ...times.map((t) => (ready / t).toFixed(2)), '']);
    console.log(`${NAME}, ${(bytes.length / 1e6).toFixed(0)} MB; worker with 2 threads\n`);
    console.log(table(rows));
    const worker = product.workerPeakBytes();
    const peaks = theirs.map((runs) => megabytes(Math.max(...runs.map((r) => r.peakBytes))));
    console.log(`\npeak memory: worker ${megabytes(worker)} over all rounds, numpy ${peaks.join(' and ')}`);
    console.log('Only ours: the queue, WebP encoding (numpy stops at 8-bit grey levels), the database.');
    console.log(`\n${verdict(ready, LIMIT.seconds)} queued to ready under ${LIMIT.seconds} s`);
    console.log(`${verdict(worker, LIMIT.bytes)} worker under ${megabytes(LIMIT.bytes)}`);

    const found = await agreements(product, ours[0]!.cubeId, theirs[0]!.at(-1)!);
    console.log('\nThe same numbers? Largest difference of what was stored from what numpy found:\n');
    console.log(
      table([
        ['', 'difference', 'allowed', ''],
        ...found.map(({ what, difference, allowed }) => [
          what,
          difference.toExponential(1),
          allowed.toExponential(1),
          difference <= allowed ? 'same' : 'DIFFERENT: the times do not compare',
        ]),
      ]),
    );
  } finally {
    await product.stop();
  }
}

const numpyName = (processes: number) => `numpy, ${processes} ${processes === 1 ? 'process' : 'processes'}`;
const megabytes = (bytes: number) => `${(bytes / 1e6).toFixed(0)} MB`;
