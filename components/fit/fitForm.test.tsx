import { defaultForm, fieldOf, formOf, FREE, isDefault, readFitForm, type FitForm } from './fitForm';

const form = (part: Partial<FitForm> = {}): FitForm => ({ ...defaultForm('r'), ...part });
const problems = (f: FitForm) => {
  const read = readFitForm(f);
  return 'problems' in read ? Object.keys(read.problems) : [];
};
const draft = (f: FitForm) => {
  const read = readFitForm(f);
  if ('problems' in read) throw new Error(JSON.stringify(read.problems));
  return read.draft;
};

test('untouched, the form is the usual fit of record', () => {
  expect(draft(form())).toEqual({
    readingId: 'r',
    model: 'sphere',
    options: { setAside: true, bootstrap: 500, seed: 1 },
  });
  expect(isDefault(form())).toBe(true);
  expect(isDefault(form({ setAside: false }))).toBe(false);
});

test('a start set by hand is sent, and comes back with the fit to be run again', () => {
  const start = { theta: 1.2, vSys: -40, vExp: 12 };
  const sent = draft(defaultForm('r', start));
  expect(sent.options.start).toEqual(start);
  expect(isDefault(defaultForm('r', start))).toBe(false);
  const again = formOf({ readingId: 'r', model: 'sphere', options: sent.options });
  expect(draft(again).options).toEqual(sent.options);
  expect(draft({ ...again, start: null }).options).not.toHaveProperty('start');
});

test('each way to constrain is sent in the parameter’s unit, commas and true minus signs read', () => {
  const f = form({
    parameters: {
      vSys: { ...FREE, mode: 'prior', value: '−40,5', sd: '2' },
      theta: { ...FREE, mode: 'bounds', low: '0.5', high: '' },
      vExp: { ...FREE, mode: 'prior', value: '12', sd: '1', high: '20' },
      b: { ...FREE, mode: 'fixed', value: '-3' },
      l: { ...FREE, mode: 'free', value: '99' },
    },
  });
  expect(draft(f).options.constraints).toEqual({
    vSys: { prior: { mean: -40.5, sd: 2 } },
    theta: { low: 0.5 },
    vExp: { prior: { mean: 12, sd: 1 }, high: 20 },
    b: { fixed: -3 },
  });
});

test('what the chosen model does not have is not sent', () => {
  const parameters = { axisRatio: { ...FREE, mode: 'fixed' as const, value: '0.8' } };
  expect(draft(form({ parameters })).options.constraints).toBeUndefined();
  expect(draft(form({ parameters, model: 'elliptical' })).options.constraints).toEqual({
    axisRatio: { fixed: 0.8 },
  });
});

test('one cap asks for v_sys, and bounds alone do not answer', () => {
  expect(problems(form({ model: 'cap' }))).toEqual(['vSys']);
  const bounds = { vSys: { ...FREE, mode: 'bounds' as const, low: '-50' } };
  expect(problems(form({ model: 'cap', parameters: bounds }))).toEqual(['vSys']);
  const held = { vSys: { ...FREE, mode: 'fixed' as const, value: '-40' } };
  expect(draft(form({ model: 'cap', parameters: held })).options.constraints).toEqual({
    vSys: { fixed: -40 },
  });
  const empty = { vSys: { ...FREE, mode: 'fixed' as const } };
  expect(problems(form({ model: 'cap', parameters: empty }))).toEqual(['vSys.value']);
});

test.each([
  ['no reading', { readingId: null }, ['readingId']],
  ['half a draw', { draws: '1.5' }, ['draws']],
  ['too many draws', { draws: '5001' }, ['draws']],
  ['words for a seed', { seed: 'lucky' }, ['seed']],
  [
    'a radius of nought',
    { parameters: { theta: { ...FREE, mode: 'fixed' as const, value: '0' } } },
    ['theta.value'],
  ],
  [
    'bounds the wrong way round',
    { parameters: { vExp: { ...FREE, mode: 'bounds' as const, low: '20', high: '10' } } },
    ['vExp.high'],
  ],
  ['bounds left empty', { parameters: { vExp: { ...FREE, mode: 'bounds' as const } } }, ['vExp.low']],
  [
    'a prior without an error',
    { parameters: { vExp: { ...FREE, mode: 'prior' as const, value: '10' } } },
    ['vExp.sd'],
  ],
])('%s is told beside its field', (_, part, fields) => expect(problems(form(part))).toEqual(fields));

test('a fit’s own settings fill the form and come out the same', () => {
  const options = {
    setAside: false,
    bootstrap: 200,
    seed: 9,
    constraints: { vSys: { fixed: -40 }, vExp: { prior: { mean: 10, sd: 1 }, low: 2 } },
  };
  expect(draft(formOf({ readingId: 'r', model: 'drifting', options }))).toEqual({
    readingId: 'r',
    model: 'drifting',
    options,
  });
  const old = { setAside: true, bootstrap: 500, seed: 1, vSys: { value: -40, sigma: 2 } };
  expect(draft(formOf({ readingId: 'r', model: 'cap', options: old })).options.constraints).toEqual({
    vSys: { prior: { mean: -40, sd: 2 } },
  });
});

test.each([
  ['options.constraints.vSys.prior.sd', 'vSys.sd'],
  ['constraints.theta.low', 'theta.low'],
  ['constraints.vExp.fixed', 'vExp.value'],
  ['vSys', 'vSys'],
  ['options.bootstrap', 'draws'],
  ['readingId', 'readingId'],
  ['marks.3.x', null],
  [undefined, null],
])('the server’s field %s belongs to %s', (field, place) => expect(fieldOf(field)).toBe(place));
