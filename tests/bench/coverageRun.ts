import { seededRandom } from '@/shared/random';
import { percentiles } from '@/shared/shell/bootstrap';
import { fitShell } from '@/shared/shell/fit';
import { intervalOf } from '@/shared/shell/intervals';
import { PARAMETER_NAMES } from '@/shared/shell/shellModel';
import { tHalfWidth } from '@/shared/shell/studentT';
import { DESIGNS, simulate } from './coverageDesigns';

export const METHODS = ['fourSource', 'bootstrap'] as const;
export const LEVELS = ['68', '95'] as const;
export type Method = (typeof METHODS)[number];
export type Level = (typeof LEVELS)[number];
/** A number for each of l, b, theta, vSys, vExp. */
export type ByParameter = number[];

/** Some simulations of one case. */
export interface Batch {
  name: string;
  from: number;
  to: number;
  draws: number;
}

export interface BatchResult {
  name: string;
  /** Fits that settled away from the bounds: only they are counted. */
  fits: number;
  setAside: number;
  hits: Record<Method, Record<Level, ByParameter>>;
}

const NAMES = PARAMETER_NAMES.sphere;
const PROBABILITY = 0.95;

/** Simulate, fit and count the intervals that hold the truth. A simulation has its own seed, whatever the batches. */
export function runBatch({ name, from, to, draws }: Batch): BatchResult {
  const design = DESIGNS.get(name)!;
  const number = [...DESIGNS.keys()].indexOf(name);
  const truth = NAMES.map((p) => design[p as 'l' | 'b' | 'theta' | 'vSys' | 'vExp']);
  const none = () => ({ '68': NAMES.map(() => 0), '95': NAMES.map(() => 0) });
  const result: BatchResult = { name, fits: 0, setAside: 0, hits: { fourSource: none(), bootstrap: none() } };
  for (let i = from; i < to; i++) {
    const seed = 100_000 * number + i;
    const input = simulate(design, seededRandom(seed));
    let drawn = new Float64Array();
    const fit = (bootstrap: number) =>
      fitShell(input, {
        model: input.vSys ? 'cap' : 'sphere',
        optimiser: 'live',
        bootstrap,
        seed,
        onDraws: (values) => (drawn = Float64Array.from(values)),
      });
    const [live, record] = [fit(0), fit(draws)];
    result.setAside += live.extra.setAside.length;
    const isCounted = live.extra.settled && live.extra.convergence?.reason !== 'at-bound';
    if (!isCounted) continue;
    result.fits++;
    const count = (method: Method, level: Level, a: number, lo: number | null, hi: number | null) => {
      if ((lo ?? -Infinity) <= truth[a]! && truth[a]! <= (hi ?? Infinity)) result.hits[method][level][a]!++;
    };
    NAMES.forEach((p, a) => {
      const { value, se, lo, hi } = live.parameters[p]!;
      count('fourSource', '68', a, lo, hi);
      const wide = intervalOf(a, value, tHalfWidth(live.extra.tDof[p]!, PROBABILITY) * (se ?? Infinity));
      count('fourSource', '95', a, wide.lo, wide.hi);
      count('bootstrap', '68', a, record.parameters[p]!.lo, record.parameters[p]!.hi);
      const period = p === 'l' ? 360 : undefined;
      const outer = percentiles(drawn, NAMES.length, a, value, period, (1 - PROBABILITY) / 2);
      count('bootstrap', '95', a, outer.lo, outer.hi);
    });
  }
  return result;
}

/** The two results of one case, put together. */
export function joined(a: BatchResult, b: BatchResult): BatchResult {
  const sum = (p: ByParameter, q: ByParameter) => p.map((value, i) => value + q[i]!);
  const levels = (method: Method) => ({
    '68': sum(a.hits[method]['68'], b.hits[method]['68']),
    '95': sum(a.hits[method]['95'], b.hits[method]['95']),
  });
  return {
    name: a.name,
    fits: a.fits + b.fits,
    setAside: a.setAside + b.setAside,
    hits: { fourSource: levels('fourSource'), bootstrap: levels('bootstrap') },
  };
}

/** In a process of its own: batches come as messages, results go back. */
if (require.main === module)
  process.on('message', (batch: Batch) => {
    process.send!(runBatch(batch));
  });
