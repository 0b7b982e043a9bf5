import { ago, count, decimals, duration, fileSize } from './format';

test.each([
  [0, '0 B'],
  [999, '999 B'],
  [1500, '1.5 kB'],
  [134_217_728, '134 MB'],
  [999_600, '1.0 MB'],
  [2.1e9, '2.1 GB'],
])('%d bytes are %s', (bytes, text) => expect(fileSize(bytes)).toBe(text));

test.each([
  [0.2, '1 s'],
  [89, '89 s'],
  [150, '3 min'],
  [4800, '80 min'],
  [7200, '2 h'],
  [9000, '2 h 30 min'],
])('%d seconds are %s', (seconds, text) => expect(duration(seconds)).toBe(text));

test('counts, ages and signs', () => {
  expect([count(1, 'cube'), count(0, 'cube'), count(2, 'reading')]).toEqual([
    '1 cube',
    '0 cubes',
    '2 readings',
  ]);
  const now = Date.parse('2026-06-03T12:00:00Z');
  expect(ago('2026-06-03T11:59:30Z', now)).toBe('just now');
  expect(ago('2026-06-03T11:50:00Z', now)).toBe('10 min ago');
  expect(ago('2026-06-03T07:00:00Z', now)).toBe('5 h ago');
  expect(decimals(-41.25, 1)).toBe('\u221241.3');
  expect(decimals(-0.01, 1)).toBe('0.0');
});
