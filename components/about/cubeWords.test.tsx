import {
  angleWords,
  beamWords,
  bitsWords,
  projectionWords,
  rangeWords,
  restFrequencyWords,
  restWords,
} from '@/components/about/cubeWords';

test('angles in degrees and in minutes or seconds of arc', () => {
  expect(angleWords(0.05)).toBe('0.05° (3′)');
  expect(angleWords(30 / 3600)).toBe('0.00833° (30″)');
  expect(angleWords(12.5)).toBe('12.5°');
});

test('a beam has an angle only where it is not round', () => {
  expect(beamWords({ major: 0.15, minor: 0.15, angle: 0 })).toBe('9′');
  expect(beamWords({ major: 0.15, minor: 0.1, angle: 30 })).toBe('9′ × 6′ at 30°');
  expect(beamWords({ major: 20 / 3600, minor: 15 / 3600, angle: -5 })).toContain('20″ × 15″');
  expect(beamWords(null)).toBe('not said');
});

test('velocities rise, with the digits that the channels need', () => {
  const axis = { type: 'FREQ', convention: 'radio', frame: 'LSRK', restFrequencyHz: 1420405751.768 };
  expect(rangeWords({ ...axis, velocities: [14, -62.14], channelWidth: 1.03 })).toBe('−62.1 … 14.0 km/s');
  expect(rangeWords({ ...axis, velocities: [0, 8.4546], channelWidth: 0.066 })).toBe('0.00 … 8.45 km/s');
});

test('codes are named, unknown ones left as they are', () => {
  expect(projectionWords('CAR')).toBe('plate carrée (CAR)');
  expect(projectionWords('XYZ')).toBe('XYZ');
  expect(restWords('LSRK')).toBe('local standard of rest, kinematic (LSRK)');
  expect(restWords(null)).toBe('not said');
  expect(restFrequencyWords(1420405751.768)).toBe('1420.405752 MHz');
  expect([bitsWords(-32), bitsWords(16)]).toEqual(['32-bit floating point', '16-bit integers']);
});
