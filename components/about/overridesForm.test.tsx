import { fieldsOf, placeProblem, readOverrides } from '@/components/about/overridesForm';
import type { CubeOverrides } from '@/shared/contract/cubes';

const empty = fieldsOf(null);
const before: CubeOverrides = {
  unit: 'K',
  restFrequencyHz: 1420405751.768,
  beam: { major: 0.15, minor: 0.1, angle: 30 },
};

test('an untouched form changes nothing', () => {
  expect(readOverrides(empty, null)).toEqual({ change: {} });
  expect(readOverrides(fieldsOf(before), before)).toEqual({ change: {} });
});

test('MHz and minutes of arc go out as Hz and degrees', () => {
  const fields = { ...empty, restMHz: '1420,40575', major: '9', minor: '6', angle: '−12.5', unit: 'Jy/beam' };
  expect(readOverrides(fields, null)).toEqual({
    change: {
      unit: 'Jy/beam',
      restFrequencyHz: 1420405750,
      beam: { major: 0.15, minor: 0.1, angle: -12.5 },
    },
  });
  const round = readOverrides({ ...empty, major: '3' }, null);
  expect(round).toEqual({ change: { beam: { major: 0.05, minor: 0.05, angle: 0 } } });
});

test('what is emptied is taken back, the rest left alone', () => {
  expect(readOverrides({ ...fieldsOf(before), major: '', minor: '', angle: '' }, before)).toEqual({
    change: { beam: null },
  });
  expect(readOverrides({ ...fieldsOf(before), unit: '', velocityFrame: 'LSRK' }, before)).toEqual({
    change: { unit: null, velocityFrame: 'LSRK' },
  });
});

test('says what is wrong beside the field', () => {
  const read = readOverrides({ ...empty, restMHz: 'x', major: '6', minor: '9' }, null);
  expect(read).toEqual({
    problems: {
      restMHz: 'A frequency in MHz, such as 1420.405752.',
      minor: 'The shorter width cannot exceed the longer one.',
    },
  });
  expect(readOverrides({ ...empty, minor: '3' }, null)).toHaveProperty('problems.major');
  expect(placeProblem('beam.minor', 'no')).toEqual({ minor: 'no' });
  expect(placeProblem('else', 'no')).toBeNull();
});
