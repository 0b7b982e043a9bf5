import { constraintWords, inOrder, signed, writtenValue } from './parameterWords';

test.each([
  ['vSys', { fixed: -40 }, 'held at −40 km/s'],
  ['vSys', { prior: { mean: -40.5, sd: 2 } }, 'prior −40.5 ± 2 km/s'],
  ['theta', { low: 0.5, high: 3 }, 'between 0.5° and 3°'],
  ['vExp', { low: 5 }, 'not below 5 km/s'],
  ['vExp', { prior: { mean: 10, sd: 1 }, high: 20 }, 'prior 10 ± 1 km/s, not above 20 km/s'],
  ['axisRatio', { fixed: 0.8 }, 'held at 0.8'],
  ['driftL', { high: 0.01 }, 'not above 0.01 °/(km/s)'],
  ['b', {}, 'free'],
])('%s with %j reads “%s”', (name, constraint, words) =>
  expect(constraintWords(name, constraint)).toBe(words),
);

test('parameters keep one order, whatever a record’s', () =>
  expect(inOrder(['vExp', 'driftB', 'l', 'vSys', 'unheard', 'theta'])).toEqual([
    'l',
    'theta',
    'vSys',
    'vExp',
    'driftB',
    'unheard',
  ]));

test('signs are true signs, and nought has none', () => {
  expect([signed(0.44), signed(-1.25, 2), signed(0.01), signed(-0.01)]).toEqual([
    '+0.4',
    '−1.25',
    '0.0',
    '0.0',
  ]);
  expect(writtenValue('l', 120.25)).toBe('120.25°');
});
