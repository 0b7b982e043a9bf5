import { fork } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import { PARAMETER_NAMES } from '@/shared/shell/shellModel';
import { DESIGNS } from './coverageDesigns';
import {
  joined,
  LEVELS,
  METHODS,
  type Batch,
  type BatchResult,
  type Level,
  type Method,
} from './coverageRun';
import { table } from './table';

const SIMULATIONS = 500;
const DRAWS = 200;
const BATCH = 25;
/** Two shares that differ by less than this many standard errors agree. */
const AGREEMENT = 3;
const PROCESSES = Math.min(2, availableParallelism());

interface ReferenceCase extends Record<Method, Record<Level, (number | null)[]>> {
  case: string;
  simulations: number;
}

/**
 * How many of the 68 % and 95 % intervals hold the truth, in the simulated cases of tests/reference/shells/coverage.json,
 * beside what the reference found there with other random numbers.
 */
export async function benchCoverage({ simulations = SIMULATIONS }: { simulations?: number } = {}) {
  const started = performance.now();
  const reference = readReference();
  const found = await runAll(simulations);
  const rows = [
    ['case', 'errors', ...LEVELS.map((level) => `${level} %: l b theta v_sys v_exp`), 'the reference', ''],
  ];
  const outside: string[] = [];
  let cells = 0;
  for (const theirs of reference) {
    const mine = found.get(theirs.case)!;
    for (const method of METHODS) {
      const verdicts = LEVELS.map((level) =>
        PARAMETER_NAMES.sphere.map((name, a) => {
          const other = theirs[method][level][a]!;
          if (other === null) return { mine: null, theirs: null, agrees: true };
          const share = mine.hits[method][level][a]! / mine.fits;
          const agrees = distance(share, mine.fits, other, theirs.simulations) <= AGREEMENT;
          cells++;
          if (!agrees)
            outside.push(
              `${theirs.case}, ${LABELS[method]}, ${name}, ${level} %: ${share.toFixed(3)} against ${other.toFixed(3)}`,
            );
          return { mine: share, theirs: other, agrees };
        }),
      );
      rows.push([
        method === METHODS[0] ? theirs.case : '',
        LABELS[method],
        ...verdicts.map((level) => level.map((v) => share(v.mine) + (v.agrees ? '' : '*')).join(' ')),
        verdicts.map((level) => level.map((v) => share(v.theirs)).join(' ')).join(' · '),
        verdicts.flat().every((v) => v.agrees) ? 'agrees' : 'DIFFERS',
      ]);
    }
  }
  console.log(
    `${simulations} simulations a case, ${DRAWS} draws; ${((performance.now() - started) / 1000).toFixed(0)} s\n`,
  );
  console.log(table(rows));
  console.log(
    `\n${cells - outside.length} of ${cells} cells within ${AGREEMENT} standard errors of the reference` +
      ` (by chance alone about ${(0.0027 * cells).toFixed(0)} would lie outside)` +
      outside.map((line) => `\n* ${line}`).join(''),
  );
}

const LABELS: Record<Method, string> = { fourSource: 'four-source', bootstrap: 'bootstrap' };
const share = (value: number | null) => (value === null ? '  - ' : value.toFixed(2));

const readReference = (): ReferenceCase[] =>
  JSON.parse(readFileSync(join(__dirname, '../reference/shells/coverage.json'), 'utf8')).cases;

/** Distance of two measured shares in units of the standard error of their difference, the true share taken as one. */
function distance(p: number, n: number, q: number, m: number): number {
  const both = (p * n + q * m) / (n + m);
  const se = Math.sqrt(both * (1 - both) * (1 / n + 1 / m));
  return p === q ? 0 : Math.abs(p - q) / se;
}

/** All cases in batches, shared out between processes. */
async function runAll(simulations: number): Promise<Map<string, BatchResult>> {
  const batches: Batch[] = [...DESIGNS.keys()].flatMap((name) =>
    Array.from({ length: Math.ceil(simulations / BATCH) }, (_, i) => ({
      name,
      from: i * BATCH,
      to: Math.min((i + 1) * BATCH, simulations),
      draws: DRAWS,
    })),
  );
  const found = new Map<string, BatchResult>();
  let next = 0;
  await Promise.all(
    Array.from(
      { length: PROCESSES },
      () =>
        new Promise<void>((resolve, reject) => {
          const child = fork(join(__dirname, 'coverageRun.ts'));
          const give = () => {
            const batch = batches[next++];
            if (batch) return child.send(batch);
            child.removeAllListeners();
            child.kill();
            resolve();
          };
          child.on('message', (result: BatchResult) => {
            const before = found.get(result.name);
            found.set(result.name, before ? joined(before, result) : result);
            give();
          });
          child.on('error', reject);
          child.on('exit', (code) => reject(new Error(`A process of simulations ended with ${code}.`)));
          give();
        }),
    ),
  );
  return found;
}
