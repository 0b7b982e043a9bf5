import { angleUnit, brightnessUnit, spectralUnit } from './units';

it.each([
  ['m/s', 1, true],
  ['m s-1', 1, true],
  ['m.s-1', 1, true],
  ['km s**-1', 1000, true],
  ['km/s', 1000, true],
  ['KM/S', 1000, false],
  ['KM S-1', 1000, false],
])('speed in %s', (unit, factor, exact) => {
  expect(spectralUnit('VRAD', unit)).toEqual({ factor, exact });
});

it('reads the units of each kind of axis, and no others', () => {
  expect(spectralUnit('FREQ', 'GHz')).toEqual({ factor: 1e9, exact: true });
  expect(spectralUnit('WAVE', 'cm')).toEqual({ factor: 0.01, exact: true });
  expect(spectralUnit('ZOPT', '')).toEqual({ factor: 1, exact: true });
  expect(spectralUnit('FREQ', 'km/s')).toBeNull();
  expect(spectralUnit('VRAD', 'toString')).toBeNull();
  expect(angleUnit('arcsec')!.factor).toBeCloseTo(1 / 3600, 18);
  expect(angleUnit('DEG')).toEqual({ factor: 1, exact: false });
  expect(angleUnit('m')).toBeNull();
});

it.each([
  ['K', 'K', true],
  ['k', 'K', true],
  ['Kelvin', 'K', true],
  ['K (Tb)', 'K', true],
  ['K Tmb', 'K', true],
  ['mK', 'mK', true],
  ['MK', 'mK', false],
  ['Jy/beam', 'Jy/beam', true],
  ['JY/BEAM', 'Jy/beam', true],
  ['Jy beam-1', 'Jy/beam', true],
  ['Jy beam^-1', 'Jy/beam', true],
  ['mJy/beam', 'mJy/beam', true],
  ['MJY/BEAM', 'mJy/beam', false],
])('brightness %s', (bunit, unit, exact) => {
  expect(brightnessUnit(bunit)).toEqual({ unit, exact });
});

it.each(['COUNTS', 'Jy', 'Jy/sr', 'MJy/beam', 'Jy beam', 'Jy/beam-1', 'km/s', ''])(
  '%s is no brightness',
  (bunit) => {
    expect(brightnessUnit(bunit)).toBeNull();
  },
);
