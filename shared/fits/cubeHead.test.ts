import { isProblem } from '@/shared/contract/problem';
import { buildWcs } from '@/shared/sky/wcs';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import { describeCube } from './cubeHead';

const CARDS = {
  SIMPLE: 'T',
  BITPIX: '-32',
  NAXIS: '3',
  NAXIS1: '8',
  NAXIS2: '7',
  NAXIS3: '6',
  CTYPE1: "'GLON-CAR'",
  CRVAL1: '118.0',
  CDELT1: '-0.1',
  CRPIX1: '4.5',
  CTYPE2: "'GLAT-CAR'",
  CRVAL2: '0.0',
  CDELT2: '0.1',
  CRPIX2: '4.0',
  CTYPE3: "'VRAD'",
  CRVAL3: '-61840.0',
  CDELT3: '5150.0',
  CRPIX3: '1.0',
  CUNIT3: "'m/s'",
  RESTFRQ: '1420405751.768',
  SPECSYS: "'LSRK'",
  BUNIT: "'K'",
};
type Changes = Record<string, string | null>;

/** The cube above with cards changed, taken out (null) or added. */
const bytesOf = (changes: Changes = {}) =>
  headerBytesOf(
    Object.entries({ ...CARDS, ...changes })
      .filter(([, value]) => value !== null)
      .map(([keyword, value]) => `${keyword.padEnd(8)}= ${value}`),
  );
const describeWith = (changes: Changes) => describeCube(bytesOf(changes));
const refusal = (changes: Changes, fileSize?: number) => {
  try {
    describeCube(bytesOf(changes), fileSize);
  } catch (error) {
    if (isProblem(error)) return error;
    throw error;
  }
  throw new Error('accepted');
};

describe('describeCube', () => {
  it('says what a plain cube is', () => {
    expect(describeWith({})).toMatchObject({
      shape: { nx: 8, ny: 7, channels: 6 },
      bitpix: -32,
      dataOffset: 2880,
      dataBytes: 8 * 7 * 6 * 4,
      frame: 'galactic',
      projection: 'CAR',
      unit: 'K',
      blank: null,
      cautions: [],
    });
  });

  it('survives JSON unchanged', () => {
    const head = describeWith({ BITPIX: '64', BLANK: '-9223372036854775808' });
    expect(JSON.parse(JSON.stringify(head))).toEqual(head);
    expect(head.blank).toBe('-9223372036854775808');
  });

  it.each([
    ['BITPIX', { BITPIX: '12' }],
    ['BITPIX', { BITPIX: null }],
    ['NAXIS', { NAXIS: '-3' }],
    ['NAXIS2', { NAXIS2: '-7' }],
    ['NAXIS1', { NAXIS1: '0' }],
    ['NAXIS3', { NAXIS3: null }],
    ['NAXIS3', { NAXIS3: '6.5' }],
    ['CRVAL3', { CRVAL3: "'about -62'" }],
    ['CDELT1', { CDELT1: '0.0' }],
    ['CDELT3', { CDELT3: '0.0' }],
    ['PC1_1', { PC1_1: '1', PC1_2: '1', PC2_1: '1', PC2_2: '1', CDELT1: '0.1' }],
    ['CD1_1', { CD1_1: '1', CD1_2: '2', CD2_1: '2', CD2_2: '4' }],
    ['PC1_3', { PC1_3: '0.2' }],
    ['CTYPE1', { CTYPE1: "'GLON-ZZZ'", CTYPE2: "'GLAT-ZZZ'" }],
    ['CTYPE2', { CTYPE2: "'GLAT-SFL'" }],
    ['CTYPE2', { CTYPE2: "'DEC--CAR'" }],
    ['CTYPE3', { CTYPE3: "'XSPEED'" }],
    ['CTYPE3', { CTYPE3: "'VRAD-TAB'" }],
    ['CTYPE3', { CTYPE3: "'AWAV'", CUNIT3: null }],
    ['CUNIT3', { CUNIT3: "'furlong'" }],
    ['CUNIT1', { CUNIT1: "'m'" }],
    ['CRVAL3', { CTYPE3: "'FREQ'", CUNIT3: "'Hz'", CRVAL3: '-1.4E9', CDELT3: '1000.0' }],
    ['PV2_1', { CTYPE1: "'GLON-CEA'", CTYPE2: "'GLAT-CEA'", PV2_1: '0.0' }],
    ['CRVAL2', { CRVAL2: '91.0' }],
    ['RADESYS', { CTYPE1: "'RA---TAN'", CTYPE2: "'DEC--TAN'", RADESYS: "'GAPPT'" }],
    ['BSCALE', { BSCALE: '0.0' }],
    ['SIMPLE', { SIMPLE: 'F' }],
    ['PV1_1', { PV1_1: '10.0' }],
    ['CDELT1', { CDELT1: '1E307' }],
    ['CDELT2', { CDELT2: '-500.0' }],
    ['CRPIX2', { CRPIX2: '1E300' }],
    ['CRVAL1', { CRVAL1: '1E300' }],
    ['BSCALE', { BITPIX: '16', BSCALE: '1E308' }],
    ['BZERO', { BITPIX: '16', BZERO: '1E300' }],
    ['ZCMPTYPE', { SIMPLE: null, XTENSION: "'BINTABLE'", ZIMAGE: 'T' }],
  ])('refuses, naming %s, with %j', (card, changes) => {
    expect(refusal(changes)).toMatchObject({ type: 'fits-card', extra: { card } });
  });

  it.each([
    ['two axes', { NAXIS: '2' }],
    ['no axes', { NAXIS: '0' }],
    ['one channel', { NAXIS3: '1' }],
    ['Stokes for a spectral axis', { CTYPE3: "'STOKES'" }],
    ['two longitudes', { CTYPE2: "'GLON-CAR'" }],
    ['a table', { SIMPLE: null, XTENSION: "'BINTABLE'" }],

    ['random groups', { GROUPS: 'T', NAXIS1: '0' }],
  ])('refuses %s', (_what, changes) => {
    expect(refusal(changes)).toMatchObject({ type: 'fits-shape', detail: expect.stringMatching(/\w/) });
  });

  it('names the bytes a file lacks, without allocating them', () => {
    const short = refusal({}, 2880 + 8 * 7 * 6 * 4 - 10);
    expect(short).toMatchObject({ type: 'fits-truncated', extra: { missingBytes: 10 } });
    const huge = { NAXIS1: '2000000000', NAXIS2: '2000000000', NAXIS3: '2000000000' };
    expect(refusal(huge, 2880).type).toBe('fits-truncated');
    expect(refusal(huge).type).toBe('fits-card');
  });

  it.each([
    ['CUNIT3', { CUNIT3: "'KM/S'" }, /without regard to capitals/],
    ['no CUNIT that looks like km/s', { CUNIT3: null, CRVAL3: '-61.84', CDELT3: '5.15' }, /look like km\/s/],
    ['no CRPIX3', { CRPIX3: null }, /CRPIX3 is missing; it is 0/],
    ['no SPECSYS', { SPECSYS: null }, /no SPECSYS/],
    ['TOPOCENT', { SPECSYS: "'TOPOCENT'" }, /telescope/],
    ['RESTFRQ of zero', { RESTFRQ: '0.0' }, /no rest frequency and is ignored/],
    ['RESTFRQ beyond sense', { RESTFRQ: '5E-324' }, /no rest frequency and is ignored/],
    ['BLANK on floats', { BLANK: '-1' }, /floating-point/],
    ['no BUNIT', { BUNIT: null }, /BUNIT is missing/],
    ['BUNIT that is none', { BUNIT: "'COUNTS'" }, /not understood/],
    ['Jy/beam without a beam', { BUNIT: "'Jy/beam'" }, /no beam/],
    ['a beam that is text', { BMAJ: "'varies'" }, /BMAJ is not a number/],
    ['Stokes planes', { NAXIS: '4', NAXIS4: '2', CTYPE4: "'STOKES'" }, /first is read/],
    ['no projection', { CTYPE1: "'GLON'", CTYPE2: "'GLAT'" }, /no projection/],
    ['J2000', { CTYPE1: "'RA---TAN'", CTYPE2: "'DEC--TAN'", EQUINOX: "'J2000.0'" }, /read as 2000/],
  ])('cautions about %s', (_what, changes, sentence) => {
    expect(describeWith(changes).cautions.join('\n')).toMatch(sentence);
  });

  it('takes the first of two cards that differ, and says so', () => {
    const cards = Object.entries(CARDS).map(([k, v]) => `${k.padEnd(8)}= ${v}`);
    const head = describeCube(headerBytesOf([...cards, 'CRVAL3  = 99000.0', 'OBSERVER= 1', 'OBSERVER= 2']));
    expect(head.spectral.velocities[0]).toBeCloseTo(-61.84, 12);
    expect(head.cautions).toEqual([expect.stringMatching(/CRVAL3 stands in the header more than once/)]);
  });

  it('reads longitude and latitude without a projection as linear', () => {
    const head = describeWith({ CTYPE1: "'GLON'", CTYPE2: "'GLAT'", CRVAL2: '30.0' });
    const { l, b } = buildWcs(head.wcs).pixelToGalactic(0, 6)!;
    expect(l).toBeCloseTo(118.35, 10);
    expect(b).toBeCloseTo(30.3, 10);
  });

  it('assumes neutral hydrogen for a frequency axis without a line, and keeps that apart', () => {
    const head = describeWith({
      CTYPE3: "'FREQ'",
      CUNIT3: "'MHz'",
      CRVAL3: '1420.0',
      CDELT3: '0.01',
      RESTFRQ: null,
    });
    expect(head.spectral).toMatchObject({ restFrequencyHz: null, assumedRestFrequencyHz: 1420405751.768 });
    expect(head.cautions.join()).toMatch(/neutral hydrogen/);
  });

  it('takes a beam from an old HISTORY line', () => {
    const cards = Object.entries(CARDS).map(([k, v]) => `${k.padEnd(8)}= ${v}`);
    const head = describeCube(
      headerBytesOf([...cards, 'HISTORY CLEAN BMAJ=  1.6667E-02 BMIN=  1.3889D-02 BPA=  12.50']),
    );
    expect(head.beam).toEqual({
      majorDeg: 0.016667,
      minorDeg: 0.013889,
      positionAngleDeg: 12.5,
      source: 'history',
    });
  });

  it.each<Changes>([{ CROTA2: '5E-324' }, { CDELT1: '-5E-324' }, { CRVAL3: '-5E-324' }, { CRVAL2: '-0.0' }])(
    'survives JSON with %j, which comes near zero from below',
    (changes) => {
      let head;
      try {
        head = describeWith(changes);
      } catch (error) {
        expect(isProblem(error)).toBe(true);
        return;
      }
      expect(JSON.parse(JSON.stringify(head))).toEqual(head);
    },
  );

  it('names the planes of a Stokes axis and reads the chosen one', () => {
    const cards = Object.entries({
      ...CARDS,
      ...{ NAXIS: '4', NAXIS4: '3', CTYPE4: "'STOKES'", CRVAL4: '2', CRPIX4: '2', CDELT4: '1' },
    }).map(([k, v]) => `${k.padEnd(8)}= ${v}`);
    const bytes = headerBytesOf(cards);
    const first = describeCube(bytes);
    expect(first.choices!.stokes).toEqual([
      { index: 0, name: 'I' },
      { index: 1, name: 'Q' },
      { index: 2, name: 'U' },
    ]);
    expect(first.layout.stokes).toEqual({ axis: 3, plane: 0 });
    const third = describeCube(bytes, undefined, { stokes: 2 });
    expect(third.layout.stokes).toEqual({ axis: 3, plane: 2 });
    expect(third.cautions).toEqual([]);
    for (const stokes of [3, -1, 0.5])
      expect(() => describeCube(bytes, undefined, { stokes })).toThrow(/there is no plane/);
    expect(() => describeCube(bytesOf(), undefined, { stokes: 1 })).toThrow(/one plane only/);
    expect(describeCube(bytesOf(), undefined, { stokes: 0 }).layout).not.toHaveProperty('stokes');
  });
});
