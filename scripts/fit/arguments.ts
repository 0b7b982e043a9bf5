import { EDGES, type Edge } from '@/shared/contract/traces';
import { Problem } from '@/shared/contract/problem';
import type { FitOptions } from '@/shared/shell/fit';
import type { Constraint, Constraints } from '@/shared/shell/fitResult';

export const USAGE = `npm run fit -- [cube.fits] marks.json [options]
  --model sphere|cap|drifting|elliptical
  --bootstrap n           draws whose percentiles become the intervals; none without it
  --seed n                of its random numbers; 1 without it
  --robust on|off         set marks aside that lie off their own ring (on), or keep all
  --fix name=value        hold a parameter: l, b, theta, vSys, vExp, driftL, driftB, axisRatio, positionAngle
  --prior name=mean,sd    give it a Gaussian prior, which counts as a datum
  --bound name=low,high   keep it between bounds; either may be left empty
  --start theta,vSys,vExp begin there (degrees, km/s) instead of with values worked out from the marks
  --trace ridge|inner     with a cube: trace the rim around the fit of the marks, and print the fit of the traced rim`;

export interface Request {
  cube: string | null;
  marks: string;
  options: FitOptions;
  constraints: Constraints;
  trace: Edge | null;
}

/**
 * The command line of the headless fit.
 *
 * @throws Problem invalid-input, its field the option at fault
 */
export function parse(args: readonly string[]): Request {
  const files: string[] = [];
  const options: FitOptions = { extras: true };
  const constraints: Constraints = {};
  let trace: Edge | null = null;
  for (let i = 0; i < args.length; i++) {
    const arg = args[i]!;
    if (!arg.startsWith('--')) {
      files.push(arg);
      continue;
    }
    const equals = arg.indexOf('=');
    const name = equals < 0 ? arg : arg.slice(0, equals);
    const value = equals < 0 ? args[++i] : arg.slice(equals + 1);
    if (value === undefined) throw wrong(name, `${name} needs a value`);
    if (name === '--model') options.model = value as FitOptions['model'];
    else if (name === '--bootstrap') options.bootstrap = whole(name, value);
    else if (name === '--seed') options.seed = whole(name, value);
    else if (name === '--robust') options.setAside = oneOf(name, value, ['on', 'off']) === 'on';
    else if (name === '--start') options.start = started(name, value);
    else if (name === '--fix') add(constraints, name, value, 1, ([fixed]) => ({ fixed }));
    else if (name === '--prior')
      add(constraints, name, value, 2, ([mean, sd]) => ({ prior: { mean: mean!, sd: sd! } }));
    else if (name === '--bound') add(constraints, name, value, 2, bounds);
    else if (name === '--trace') trace = oneOf(name, value, EDGES);
    else throw wrong(name, `${name} is not understood`);
  }
  if (files.length < 1 || files.length > 2)
    throw wrong('marks', files.length === 0 ? 'No marks file is named' : 'Too many files are named');
  const [first, second] = files as [string, string?];
  const cube = second === undefined ? null : first;
  if (trace !== null && cube === null)
    throw wrong('--trace', 'The rim can be traced only through a cube: name its file before the marks');
  return { cube, marks: second ?? first, options, constraints, trace };
}

type Numbers = (number | undefined)[];

/** Add what one option says of a parameter to what others said of it. */
function add(
  constraints: Constraints,
  option: string,
  text: string,
  count: number,
  read: (values: Numbers) => Constraint,
): void {
  const form = { '--fix': 'name=value', '--prior': 'name=mean,sd', '--bound': 'name=low,high' }[option];
  const [name, list, ...more] = text.split('=');
  const parts = (list ?? '').split(',').map((part) => part.trim());
  const empty = (part: string) => part === '' && option === '--bound';
  const bad = parts.some((part) => !empty(part) && !(part !== '' && Number.isFinite(Number(part))));
  if (!name || more.length > 0 || parts.length !== count || bad || parts.every((part) => part === ''))
    throw wrong(option, `${option} is given as ${form}, with numbers, not "${text}"`);
  const said = read(parts.map((part) => (part === '' ? undefined : Number(part))));
  const before = constraints[name] ?? {};
  const twice = Object.keys(said).some((key) => key in before);
  if (twice) throw wrong(option, `${option} is given twice for ${name}`);
  constraints[name] = { ...before, ...said };
}

const bounds = ([low, high]: Numbers): Constraint => ({
  ...(low === undefined ? {} : { low }),
  ...(high === undefined ? {} : { high }),
});

function started(name: string, text: string): NonNullable<FitOptions['start']> {
  const parts = text.split(',').map((part) => (part.trim() === '' ? NaN : Number(part)));
  const [theta, vSys, vExp] = parts;
  if (parts.length !== 3 || !parts.every(Number.isFinite))
    throw wrong(name, `${name} is given as theta,vSys,vExp, with numbers, not "${text}"`);
  return { theta: theta!, vSys: vSys!, vExp: vExp! };
}

function whole(name: string, text: string): number {
  if (!/^\d+$/.test(text)) throw wrong(name, `${name} needs a whole number, not "${text}"`);
  return Number(text);
}

function oneOf<T extends string>(name: string, text: string, allowed: readonly T[]): T {
  if (!(allowed as readonly string[]).includes(text))
    throw wrong(name, `${name} is ${allowed.join(' or ')}, not "${text}"`);
  return text as T;
}

const wrong = (field: string, what: string) =>
  new Problem('invalid-input', `${what}. Usage: ${USAGE}.`, { field: field.replace(/^--/, '') });
