import { errorDecimals, fixed, formatQuantity, plainNumber } from './quantity';

test.each([
  [0.7, 1],
  [0.04, 2],
  [1.7, 1],
  [0.354, 2],
  [0.355, 1],
  [15, 0],
  [0.00112, 4],
  [0.0962, 2],
  [9.996, 0],
  [1234, -2],
  [5600, -3],
])('an error of %d is given %d decimals', (error, decimals) => expect(errorDecimals(error)).toBe(decimals));

test.each([0, -1, NaN, Infinity])('an error of %d decides nothing', (error) =>
  expect(errorDecimals(error)).toBeNull(),
);

test.each([
  [{ value: 18.4312, se: 0.713, unit: 'km/s' }, '18.4 ± 0.7 km/s'],
  [{ value: 254.3, se: 15.2, unit: 'pc' }, '254 ± 15 pc'],
  [{ value: 241.8712, se: 0.0421, unit: 'deg' }, '241.87 ± 0.04°'],
  [{ value: -36.44, se: 0.52, unit: 'km/s' }, '\u221236.4 ± 0.5 km/s'],
  [{ value: 12345, se: 1234, unit: 'pc' }, '12300 ± 1200 pc'],
  [{ value: 28.13, se: 1, lo: 27.2, hi: 29.3, unit: 'km/s' }, '28.1 +1.2 \u22120.9 km/s'],
  [{ value: 28.13, se: 0.7, lo: 27.43, hi: 28.84, unit: 'km/s' }, '28.1 ± 0.7 km/s'],
  [{ value: 28.13, se: null, lo: 27.2, hi: null, unit: 'km/s' }, '28.1 no upper bound \u22120.9 km/s'],
  [{ value: 15.647, se: 0.205, lo: 15.435, hi: 15.868, unit: 'km/s' }, '15.65 ± 0.20 km/s'],
  [{ value: 3.25, se: null, unit: 'Myr' }, '3.25 Myr'],
  [{ value: -0.001, se: 0.2, unit: 'km/s' }, '0.00 ± 0.20 km/s'],
])('%j is written %s', (quantity, line) => expect(formatQuantity(quantity).line).toBe(line));

test('a quantity is read aloud with its sign, error and unit in words', () => {
  expect(formatQuantity({ value: -36.44, se: 0.52, unit: 'km/s' }).spoken).toBe(
    'minus 36.4 plus or minus 0.5 kilometres per second',
  );
  expect(formatQuantity({ value: NaN, se: null, unit: 'pc' }).spoken).toBe('not known parsecs');
});

test('a value that rounds to nought carries no minus sign', () => expect(fixed(-0.04, 1)).toBe('0.0'));

test.each([
  [0, '0'],
  [3.25, '3.25'],
  [-41.2, '\u221241.2'],
  [1234.56, '1235'],
  [0.00001234, '1.234e\u22125'],
])('without an error %d is %s', (value, text) => expect(plainNumber(value)).toBe(text));
