import type { Fit } from '@/shared/contract/fits';
import type { Trace } from '@/shared/contract/traces';
import { differences } from './differences';

const fit = (id: string, part: object = {}, options: object = {}): Fit =>
  ({
    id,
    model: 'sphere',
    status: 'done',
    traceId: null,
    readingRevision: 3,
    parameters: {},
    provenance: { marks: 40 },
    extra: { setAside: [] },
    options: { setAside: true, bootstrap: 500, seed: 1, ...options },
    ...part,
  }) as unknown as Fit;

test('fits that agree are told by their model alone', () =>
  expect([...differences([fit('a'), fit('b')]).values()]).toEqual([['sphere'], ['sphere']]));

test('only what differs is said, of each fit', () => {
  const found = differences([
    fit('a', { provenance: { marks: 42 }, readingRevision: 4 }),
    fit('b', {}, { bootstrap: 0 }),
    fit('c', { model: 'drifting', extra: { setAside: [1, 2] } }),
  ]);
  expect(found.get('a')).toEqual(['sphere', '42 marks, revision 4', '0 set aside', '500 draws', 'seed 1']);
  expect(found.get('b')).toEqual(['sphere', '40 marks, revision 3', '0 set aside', 'no draws']);
  expect(found.get('c')).toEqual([
    'drifting sphere',
    '40 marks, revision 3',
    '2 set aside',
    '500 draws',
    'seed 1',
  ]);
});

test('a start set by hand is said', () => {
  const start = { theta: 1.25, vSys: -40, vExp: 12 };
  const found = differences([fit('a'), fit('b', {}, { start })]);
  expect(found.get('a')).toEqual(['sphere', 'usual start']);
  expect(found.get('b')).toEqual(['sphere', 'begun with Θ 1.25°, v_sys −40 km/s, v_exp 12 km/s']);
});

test('constraints are said even where all fits share them', () => {
  const held = { constraints: { vSys: { fixed: -40 } } };
  expect(differences([fit('a', {}, held), fit('b', {}, held)]).get('a')).toEqual([
    'sphere',
    'v_sys held at −40 km/s',
  ]);
  expect(differences([fit('a', { model: 'cap' }, { vSys: { value: -40, sigma: 2 } })]).get('a')).toEqual([
    'one cap',
    'v_sys prior −40 ± 2 km/s',
  ]);
});

test('revisions of the marks and traced rims tell fits apart', () => {
  const trace = { id: 't', edge: 'inner' } as Trace;
  const found = differences(
    [fit('a', { readingRevision: 3 }), fit('b', { readingRevision: 5 }), fit('c', { traceId: 't' })],
    [trace],
  );
  expect(found.get('a')).toEqual(['sphere', 'marks by hand', '40 marks, revision 3']);
  expect(found.get('b')).toContain('40 marks, revision 5');
  expect(found.get('c')).toEqual(['sphere', 'traced inner edge', '40 marks']);
});

test('a fit under way has no counts yet', () => {
  const running = fit('a', { status: 'running', parameters: undefined, extra: undefined });
  expect(differences([running, fit('b')]).get('a')).toEqual(['sphere', 'revision 3', 'outliers set aside']);
});
