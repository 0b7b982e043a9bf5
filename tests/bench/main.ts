/**
 * npm run bench: measured speeds, on this machine, now. `npm run bench -- ingest` runs one part.
 *
 * upload  a 512 x 512 x 128 float32 cube through the real server and worker, beside numpy doing the same reductions
 * ingest  cubes of 512 x 512 x 512 pixels in three orders and formats, beside numpy on one thread (2.5 GB of files)
 * planes  random channels, cuts and spectra of those cubes, as the server times them
 * size    cubes of 2 GiB and of 2e9 pixels, and the memory they take (16 GB of disk)
 * fit     the fit and its bootstrap, beside scipy
 * coverage  how many error bars hold the truth in 18 simulated cases, beside the reference (--simulations n; 500)
 * trace   how far off traced rims are on cubes of known truth (--cubes n a setting; 12)
 * screen  the first look at that cube and stepping through its channels, in Chromium
 * viewer  scrubbing, look, opening, memory and a poor line, in Chromium
 *
 * A bench and no test: a limit that is missed is said, and the exit code stays 0. Other work on the machine shows in
 * every figure, so the load stands beside them.
 */
import { ensurePrograms } from '../../scripts/machine/debian.mjs';
import { Stop, explain } from '../../scripts/machine/stop.mjs';
import { benchCoverage } from './coverage';
import { benchFit } from './fit';
import { benchIngest } from './ingest';
import { describeMachine, load } from './machine';
import { benchPlanes } from './planes';
import { stopAll } from './product';
import { benchScreen } from './screen';
import { benchSize } from './size';
import { benchViewer } from './viewer';
import { benchTraceBias } from './traceBias';
import { benchUpload } from './upload';

const say = (line: string) => console.log(line);

/** Whole numbers given as --name n, for parts that can be shortened. */
type Options = Partial<Record<'simulations' | 'cubes', number>>;

const parts: Record<
  string,
  { programs: Parameters<typeof ensurePrograms>[0]; run: (options: Options) => Promise<unknown> }
> = {
  upload: { programs: ['postgresql', 'numpy'], run: benchUpload },
  ingest: { programs: ['postgresql', 'numpy'], run: benchIngest },
  planes: { programs: ['postgresql'], run: benchPlanes },
  size: { programs: ['postgresql'], run: benchSize },
  fit: { programs: ['scipy'], run: benchFit },
  coverage: { programs: [], run: benchCoverage },
  trace: { programs: [], run: benchTraceBias },
  screen: { programs: ['postgresql', 'chromium'], run: benchScreen },
  viewer: { programs: ['postgresql', 'chromium'], run: benchViewer },
};

async function main(args: string[]) {
  const { names, options } = parse(args);
  const unknown = names.find((name) => !(name in parts));
  if (unknown) throw new Stop(`There is no part ${unknown}. The parts: ${Object.keys(parts).join(', ')}.`);
  const chosen = names.length > 0 ? names : Object.keys(parts);
  await ensurePrograms([...new Set(chosen.flatMap((name) => parts[name]!.programs))], say);
  say(describeMachine());
  for (const name of chosen) {
    say(`\n== ${name} (load ${load()})\n`);
    await parts[name]!.run(options);
  }
  say(`\nload at the end ${load()}`);
}

function parse(args: string[]): { names: string[]; options: Options } {
  const names: string[] = [];
  const options: Options = {};
  for (const [i, arg] of args.entries()) {
    const name = /^--(simulations|cubes)$/.exec(arg)?.[1] as keyof Options | undefined;
    if (name) {
      options[name] = Number(args[i + 1]);
      if (!(Number.isInteger(options[name]) && options[name] > 0))
        throw new Stop(`${arg} needs a whole number above 0.`);
    } else if (!/^--(simulations|cubes)$/.test(args[i - 1] ?? '')) names.push(arg);
  }
  return { names, options };
}

let interrupted = false;
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const)
  process.once(signal, () => {
    interrupted = true; // what then fails was stopped under its hands
    void stopAll().finally(() => process.exit(130));
  });

main(process.argv.slice(2))
  .catch((error) => {
    if (interrupted) return;
    console.error(explain(error));
    process.exitCode = 1;
  })
  .finally(stopAll);
