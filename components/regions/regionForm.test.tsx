import { ApiProblem } from '@/hooks/api';
import { placeProblem, readNumber, readRegionForm, valuesOf, type RegionFormValues } from './regionForm';

const form = (part: Partial<RegionFormValues>): RegionFormValues => ({
  ...valuesOf(null),
  name: 'Reach',
  ...part,
});

test('numbers are read as people write them', () => {
  expect([readNumber('\u22123,5'), readNumber(' 12 '), readNumber(''), readNumber('x')]).toEqual([
    -3.5,
    12,
    null,
    NaN,
  ]);
});

test('a name alone makes a region; centre and distance stay open', () => {
  expect(readRegionForm(form({}))).toEqual({
    draft: { name: 'Reach', description: '', centre: null, distance: null },
  });
});

test.each([
  [{ name: ' ' }, 'name'],
  [{ l: '400', b: '0' }, 'l'],
  [{ l: '10', b: '91' }, 'b'],
  [{ l: '10' }, 'b'],
  [{ b: '1' }, 'l'],
  [{ distance: '0' }, 'distance'],
  [{ distance: 'near' }, 'distance'],
  [{ distanceError: '5' }, 'distance'],
  [{ distance: '100', distanceError: '-5' }, 'distanceError'],
])('%j is refused at the field %s', (part, field) => {
  const result = readRegionForm(form(part));
  expect('problems' in result && Object.keys(result.problems)).toContain(field);
});

test('a refusal of the server goes to the field it names', () => {
  const problem = (field?: string) =>
    new ApiProblem({ type: '/problems/invalid-input', title: 'No', status: 422, detail: 'Too long.', field });
  expect(placeProblem(problem('centre.b'))).toEqual({ b: 'Too long.' });
  expect(placeProblem(problem('other'))).toBeNull();
  expect(placeProblem(problem())).toBeNull();
});
