import { addressOf, filtersOf, narrowing, queryOf, sortedBy, toggled } from './filters';

test('an address goes to filters and back', () => {
  const address = {
    sort: 'vExp',
    order: 'down',
    region: 'a,b',
    status: 'in review,accepted',
    search: 'ring',
    vExpMin: '5',
    pick: 'x,y',
  };
  expect(
    Object.fromEntries(Object.entries(addressOf(filtersOf(address))).filter(([, v]) => v !== undefined)),
  ).toEqual(address);
});

test('nonsense in an address is as if it were not there', () => {
  const f = filtersOf({
    sort: 'colour',
    order: 'sideways',
    status: 'bad,draft',
    vExpMax: 'fast',
    pick: 'a,b,c,d,e',
  });
  expect(f).toMatchObject({
    sort: 'designation',
    order: 'up',
    status: ['draft'],
    vExpMax: '',
    pick: ['a', 'b', 'c', 'd'],
  });
  expect(narrowing(f)).toBe(1);
});

test('the query repeats a filter with several values, as the API reads it', () => {
  const query = new URLSearchParams(
    queryOf(filtersOf({ region: 'a,b', status: 'in review', search: ' ring ', radiusMin: '10', pick: 'x' })),
  );
  expect(query.getAll('region')).toEqual(['a', 'b']);
  expect(query.getAll('status')).toEqual(['in review']);
  expect([query.get('search'), query.get('radiusMin'), query.get('pick')]).toEqual(['ring', '10', null]);
});

test('sorting by the same column turns it round', () => {
  const once = sortedBy(filtersOf({}), 'age');
  expect(once).toMatchObject({ sort: 'age', order: 'up' });
  expect(sortedBy(once, 'age')).toMatchObject({ sort: 'age', order: 'down' });
  expect(sortedBy(sortedBy(once, 'age'), 'theta')).toMatchObject({ sort: 'theta', order: 'up' });
  expect([toggled([1, 2], 2), toggled([1], 2)]).toEqual([[1], [1, 2]]);
});
