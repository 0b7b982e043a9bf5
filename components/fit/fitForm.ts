import type {
  Constraint,
  Constraints,
  Fit,
  FitDraft,
  ModelName,
  ParameterName,
} from '@/shared/contract/fits';
import { readNumber } from '../regions/regionForm';
import { parametersOf, unitOf, writtenName } from './parameterWords';

export const MODES = ['free', 'fixed', 'bounds', 'prior'] as const;
export type Mode = (typeof MODES)[number];

/** What is said of one parameter, as typed. A prior may stand within bounds. */
export interface ParameterForm {
  mode: Mode;
  value: string;
  sd: string;
  low: string;
  high: string;
}
export type FitStart = NonNullable<Fit['options']['start']>;
export interface FitForm {
  readingId: string | null;
  model: ModelName;
  parameters: Partial<Record<ParameterName, ParameterForm>>;
  setAside: boolean;
  /** Set by hand, to begin from; null: worked out from the marks. */
  start: FitStart | null;
  draws: string;
  seed: string;
}
/** By field: `readingId`, `draws`, `seed`, `vSys`, or `vSys.sd` for one box of a parameter. */
export type FitFormProblems = Record<string, string>;

export const FREE: ParameterForm = { mode: 'free', value: '', sd: '', low: '', high: '' };
export const DRAWS = 500;

export const defaultForm = (readingId: string | null, start: FitStart | null = null): FitForm => ({
  readingId,
  model: 'sphere',
  parameters: {},
  setAside: true,
  start,
  draws: String(DRAWS),
  seed: '1',
});

/** The form that would run a fit again. */
export function formOf(fit: Pick<Fit, 'readingId' | 'model' | 'options'>): FitForm {
  const { options } = fit;
  const constraints: Constraints = { ...options.constraints };
  if (options.vSys)
    constraints.vSys =
      options.vSys.sigma > 0
        ? { prior: { mean: options.vSys.value, sd: options.vSys.sigma } }
        : { fixed: options.vSys.value };
  const parameters = Object.fromEntries(
    Object.entries(constraints).map(([name, c]) => [name, typed(c)]),
  ) as FitForm['parameters'];
  return {
    readingId: fit.readingId,
    model: fit.model,
    parameters,
    setAside: options.setAside,
    start: options.start ?? null,
    draws: String(options.bootstrap),
    seed: String(options.seed),
  };
}

function typed({ fixed, prior, low, high }: Constraint): ParameterForm {
  const text = (x: number | undefined) => (x === undefined ? '' : String(x).replace('-', '\u2212'));
  return {
    mode:
      fixed !== undefined
        ? 'fixed'
        : prior
          ? 'prior'
          : low !== undefined || high !== undefined
            ? 'bounds'
            : 'free',
    value: text(fixed ?? prior?.mean),
    sd: text(prior?.sd),
    low: text(low),
    high: text(high),
  };
}

export const isDefault = (form: FitForm): boolean => {
  const plain = defaultForm(form.readingId);
  return (
    form.model === plain.model &&
    form.setAside === plain.setAside &&
    form.start === null &&
    form.draws === plain.draws &&
    form.seed === plain.seed &&
    Object.values(form.parameters).every((p) => p.mode === 'free')
  );
};

/** The draft to send, or what is wrong by field. What a model does not have is not sent. */
export function readFitForm(form: FitForm): { draft: FitDraft } | { problems: FitFormProblems } {
  const problems: FitFormProblems = {};
  if (!form.readingId) problems.readingId = 'Choose the marks or a traced rim to fit.';
  const draws = whole(form.draws, 5000);
  if (draws === null) problems.draws = 'A whole number from 0 to 5000; 0 leaves the covariance’s error bars.';
  const seed = whole(form.seed, 0xffffffff);
  if (seed === null) problems.seed = 'A whole number from 0 to 4294967295.';
  const constraints: Constraints = {};
  for (const name of parametersOf(form.model)) {
    const constraint = readParameter(name, form.parameters[name] ?? FREE, problems);
    if (constraint) constraints[name] = constraint;
  }
  const { vSys } = constraints;
  const said = form.parameters.vSys?.mode;
  if (form.model === 'cap' && !vSys && said !== 'fixed' && said !== 'prior')
    problems.vSys =
      'One cap cannot tell v_sys: hold it, or give it a prior, from gas around the shell or another line.';
  else if (form.model === 'cap' && vSys && vSys.fixed === undefined && !vSys.prior)
    problems.vSys = 'Bounds alone do not tell v_sys of one cap: hold it, or give it a prior.';
  if (Object.keys(problems).length > 0) return { problems };
  return {
    draft: {
      readingId: form.readingId!,
      model: form.model,
      options: {
        setAside: form.setAside,
        ...(form.start && { start: form.start }),
        bootstrap: draws!,
        seed: seed!,
        ...(Object.keys(constraints).length > 0 && { constraints }),
      },
    },
  };
}

function whole(text: string, most: number): number | null {
  const n = readNumber(text);
  return n !== null && Number.isInteger(n) && n >= 0 && n <= most ? n : null;
}

/** What a parameter can be at all; ends that are excluded are marked so. */
const ranges: Record<ParameterName, { low: number; high: number; words: string }> = {
  l: { low: -360, high: 360, words: 'from −360 to 360' },
  b: { low: -90, high: 90, words: 'from −90 to 90' },
  theta: { low: Number.MIN_VALUE, high: 90, words: 'above 0, up to 90' },
  vSys: { low: -Infinity, high: Infinity, words: '' },
  vExp: { low: Number.MIN_VALUE, high: Infinity, words: 'above 0' },
  driftL: { low: -Infinity, high: Infinity, words: '' },
  driftB: { low: -Infinity, high: Infinity, words: '' },
  axisRatio: { low: Number.MIN_VALUE, high: 1, words: 'above 0, up to 1' },
  positionAngle: { low: -180, high: 180, words: 'from −180 to 180' },
};

function readParameter(
  name: ParameterName,
  { mode, ...text }: ParameterForm,
  problems: FitFormProblems,
): Constraint | null {
  const inUnit = unitOf(name) ? ` in ${unitOf(name)}` : '';
  const range = ranges[name];
  const read = (box: 'value' | 'low' | 'high', needed: boolean): number | undefined => {
    const n = readNumber(text[box]);
    if (n === null && !needed) return undefined;
    if (n !== null && Number.isFinite(n) && n >= range.low && n <= range.high) return n;
    problems[`${name}.${box}`] = `A number${inUnit}${range.words && `, ${range.words}`}.`;
    return undefined;
  };
  if (mode === 'free') return null;
  if (mode === 'fixed') {
    const fixed = read('value', true);
    return fixed === undefined ? null : { fixed };
  }
  const low = read('low', false);
  const high = read('high', false);
  if (low !== undefined && high !== undefined && low >= high)
    problems[`${name}.high`] = 'The upper bound must lie above the lower one.';
  if (mode === 'bounds') {
    if (!text.low.trim() && !text.high.trim())
      problems[`${name}.low`] = `Give a lower or an upper bound, or leave ${writtenName(name)} free.`;
    return { ...(low !== undefined && { low }), ...(high !== undefined && { high }) };
  }
  const mean = read('value', true);
  const sd = readNumber(text.sd);
  if (!(sd !== null && sd > 0 && Number.isFinite(sd)))
    problems[`${name}.sd`] = `An error${inUnit}, above 0; to hold ${writtenName(name)}, take “fixed”.`;
  if (mean === undefined || sd === null) return null;
  return { prior: { mean, sd }, ...(low !== undefined && { low }), ...(high !== undefined && { high }) };
}

/** Where the server's problem belongs in the form: 'options.constraints.vSys.prior.sd' → 'vSys.sd'. */
export function fieldOf(field: string | undefined): string | null {
  if (!field) return null;
  const path = field.replace(/^options\./, '').replace(/^constraints\./, '');
  if (path === 'bootstrap') return 'draws';
  const [head, ...rest] = path.split('.');
  if (['readingId', 'seed', 'model', 'setAside'].includes(head!)) return head!;
  if (!Object.hasOwn(ranges, head!)) return null;
  const box = {
    fixed: 'value',
    mean: 'value',
    value: 'value',
    sd: 'sd',
    sigma: 'sd',
    low: 'low',
    high: 'high',
  }[rest.at(-1) ?? ''];
  return box ? `${head}.${box}` : head!;
}
