import { isProblem } from '@/shared/contract/problem';
import { buildWcs } from '@/shared/sky/wcs';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import { describeCube } from './cubeHead';
import { applyOverrides, type Overrides } from './overrides';

const CARDS = ['SIMPLE  = T', 'BITPIX  = -32', 'NAXIS   = 3', 'NAXIS1  = 8', 'NAXIS2  = 7', 'NAXIS3  = 6'];
const SKY = ['GLON', 'GLAT'].flatMap((name, i) => [
  `CTYPE${i + 1}  = '${name}-CAR'`,
  `CRVAL${i + 1}  = 0.0`,
  `CRPIX${i + 1}  = 1.0`,
  `CDELT${i + 1}  = 0.1`,
]);
const headOf = (...spectral: string[]) =>
  describeCube(headerBytesOf([...CARDS, ...SKY, 'CRPIX3  = 1.0', ...spectral]));
const frequency = headOf("CTYPE3  = 'FREQ'", "CUNIT3  = 'Hz'", 'CRVAL3  = 1420.7E6', 'CDELT3  = -24400.5');
const radio = headOf(
  "CTYPE3  = 'VRAD'",
  'CRVAL3  = -61840.0',
  'CDELT3  = 5150.0',
  'RESTFRQ = 1420405751.768',
  "SPECSYS = 'LSRK'",
  "BUNIT   = 'Jy/beam'",
);
const refusal = (overrides: Overrides) => {
  try {
    applyOverrides(frequency, overrides);
  } catch (error) {
    if (isProblem(error)) return error;
    throw error;
  }
  throw new Error('accepted');
};

// astropy 5.2.1: astropy.wcs (wcslib 7.12) for the axis, astropy.units doppler_radio, _optical, _relativistic.
describe('velocities and frequencies', () => {
  it.each([
    [{}, [-62.104367448292486, -36.35438064936618]],
    [{ convention: 'radio' }, [-62.104367448292486, -36.35438064936618]],
    [{ convention: 'optical' }, [-62.09150470434855, -36.349972664083154]],
    [{ convention: 'relativistic' }, [-62.09793474414112, -36.352176389466]],
    [{ restFrequencyHz: 1420500000 }, [-42.20942738472369, -16.46114906219993]],
    [{ restFrequencyHz: 1420500000, convention: 'optical' }, [-42.20348532413599, -16.46024525510434]],
    [{ restFrequencyHz: 1420500000, convention: 'relativistic' }, [-42.206455936151606, -16.460697133840203]],
  ] as [Overrides, number[]][])('of a frequency axis with %j', (overrides, wanted) => {
    const head = applyOverrides(frequency, overrides);
    head.spectral.velocities.forEach((v, i) => expect(Math.abs(v - wanted[i]!)).toBeLessThan(1e-8));
    const wcs = buildWcs(head.wcs);
    expect(wcs.channelOf(wcs.velocityOf(2.25))).toBeCloseTo(2.25, 8);
    expect(wcs.frequencyHzOf(0)).toBeCloseTo(1420.7e6, 6);
  });

  it.each([
    [{ convention: 'radio' }, [1420698747.4366546, 1420576744.8741083]],
    [{ convention: 'optical' }, [1420698807.8871093, 1420576765.461298]],
    [{ convention: 'relativistic' }, [1420698777.6618814, 1420576755.1677032]],
    [{ restFrequencyHz: 1420500000 }, [1420793015.1098063, 1420671004.45202]],
  ] as [Overrides, number[]][])('of a velocity axis with %j', (overrides, wanted) => {
    const head = applyOverrides(radio, overrides);
    expect(head.spectral.velocities).toEqual(radio.spectral.velocities);
    const wcs = buildWcs(head.wcs);
    wanted.forEach((hz, i) => expect(Math.abs(wcs.frequencyHzOf(5 * i)! / hz - 1)).toBeLessThan(1e-14));
  });

  it('of an axis linear in frequency', () => {
    const head = headOf(
      "CTYPE3  = 'VOPT-F2W'",
      'CRVAL3  = -61840.0',
      'CDELT3  = 5150.0',
      'RESTFRQ = 1420405751.768',
    );
    const changed = applyOverrides(head, { restFrequencyHz: 1420500000 });
    expect(changed.spectral.velocities[1]).toBeCloseTo(-36.08778761518001, 8);
  });

  it('keep a redshift a redshift', () => {
    const head = headOf("CTYPE3  = 'ZOPT'", 'CRVAL3  = 0.01', 'CDELT3  = 0.001', 'RESTFRQ = 1420405751.768');
    const { velocities } = head.spectral;
    expect(applyOverrides(head, { convention: 'optical' }).spectral).toMatchObject({
      type: 'ZOPT',
      velocities,
    });
    const relativistic = applyOverrides(head, { convention: 'relativistic' }).spectral;
    expect(relativistic.type).toBe('VELO');
    relativistic.velocities.forEach((v, i) => expect(v).toBeCloseTo(velocities[i]!, 8));
  });
});

describe('cautions', () => {
  it('that an override answers give way to one that says what was given by hand', () => {
    const before = frequency.cautions.join('\n');
    expect(before).toMatch(/BUNIT is missing/);
    expect(before).toMatch(/no rest frequency/);
    expect(before).toMatch(/no SPECSYS/);
    const head = applyOverrides(frequency, {
      unit: 'K',
      restFrequencyHz: 1420405751.768,
      velocityFrame: 'LSRK',
    });
    expect(head).toMatchObject({ unit: 'K', bunit: null });
    expect(head.spectral).toMatchObject({
      frame: 'LSRK',
      restFrequencyHz: 1420405751.768,
      assumedRestFrequencyHz: null,
    });
    expect(head.cautions).toHaveLength(3);
    head.cautions.forEach((c) => expect(c).toMatch(/was given by hand; the header says nothing of it/));
  });

  it('about a missing beam come and go with the beam', () => {
    expect(radio.cautions.join()).toMatch(/no beam/);
    const beam = { major: 0.02, minor: 0.01, angle: 30 };
    const head = applyOverrides(radio, { beam });
    expect(head.beam).toEqual({ majorDeg: 0.02, minorDeg: 0.01, positionAngleDeg: 30, source: 'person' });
    expect(head.cautions.join()).not.toMatch(/no beam/);
    expect(applyOverrides(radio, { unit: 'K' }).cautions.join()).not.toMatch(/no beam/);
    expect(applyOverrides(radio, { unit: 'mJy/beam' }).cautions.join()).toMatch(/no beam/);
  });

  it('stay when nothing is said, and the head is not changed', () => {
    const frozen = JSON.stringify(radio);
    expect(applyOverrides(radio, { unit: null, beam: null, convention: undefined })).toEqual(radio);
    applyOverrides(radio, { unit: 'K', convention: 'optical' });
    expect(JSON.stringify(radio)).toBe(frozen);
  });
});

it.each([
  ['unit', { unit: 'counts' }],
  ['restFrequencyHz', { restFrequencyHz: 0 }],
  ['restFrequencyHz', { restFrequencyHz: NaN }],
  ['beam.major', { beam: { major: 0, minor: 0, angle: 0 } }],
  ['beam.minor', { beam: { major: 0.1, minor: 0.2, angle: 0 } }],
  ['beam.angle', { beam: { major: 0.1, minor: 0.1, angle: NaN } }],
  ['convention', { convention: 'toString' as 'radio' }],
  ['velocityFrame', { velocityFrame: 'MOON' }],
])('refuses, naming %s, %j', (field, overrides) => {
  expect(refusal(overrides)).toMatchObject({ type: 'invalid-input', extra: { field } });
});
