import { isProblem } from '@/shared/contract/problem';
import { separation } from '@/shared/sky/greatCircle';
import { buildSky } from '@/shared/sky/wcs';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import vectors from '@/tests/reference/wcs-vectors.json';
import { describeCube } from './cubeHead';
import { describeImage, type ImageHead } from './imageHead';

const CARDS: Record<string, string> = {
  SIMPLE: 'T',
  BITPIX: '-32',
  NAXIS: '2',
  NAXIS1: '8',
  NAXIS2: '7',
  CTYPE1: "'RA---TAN'",
  CTYPE2: "'DEC--TAN'",
  CRPIX1: '4.0',
  CRPIX2: '4.0',
  CRVAL1: '53.5',
  CRVAL2: '48.25',
  CDELT1: '-0.05',
  CDELT2: '0.05',
  BUNIT: "'Rayleigh'",
  OBJECT: "'Trial nebula'",
};
/** The usual header with cards changed; null leaves a card out. */
const headerWith = (changes: Record<string, string | null> = {}) =>
  headerBytesOf(
    Object.entries({ ...CARDS, ...changes }).flatMap(([k, v]) =>
      v === null ? [] : [`${k.padEnd(8)}= ${v}`],
    ),
  );
const describeWith = (changes: Record<string, string | null>, size?: number) =>
  describeImage(headerWith(changes), size);
function refusal(changes: Record<string, string | null>, size?: number) {
  try {
    describeWith(changes, size);
  } catch (error) {
    if (isProblem(error)) return error;
    throw error;
  }
  throw new Error('not refused');
}

/** A cube's header with one channel left: an image of the same sky. */
function flattened(cards: string[]): ImageHead {
  const { layout } = describeCube(headerBytesOf(cards));
  const others = layout.naxis.flatMap((_, i) =>
    i === layout.longitude || i === layout.latitude ? [] : [`NAXIS${i + 1}`.padEnd(8)],
  );
  return describeImage(
    headerBytesOf(
      cards.map((card) => (others.includes(card.slice(0, 8)) ? `${card.slice(0, 8)}= 1`.padEnd(80) : card)),
    ),
  );
}

describe.each(vectors.headers)('one channel of $id: $kind', (header) => {
  const head = flattened(header.cards);
  const sky = buildSky(JSON.parse(JSON.stringify(head.sky)));

  it('has the frame, the projection and the reference places, to 1e-10 deg', () => {
    expect(head).toMatchObject({
      frame: header.frame,
      equinox: header.equinox,
      projection: header.projection,
    });
    for (const p of header.pixels) {
      const place = sky.pixelToSky(p.x, p.y);
      const galactic = sky.pixelToGalactic(p.x, p.y);
      if (p.lon === null || p.lat === null || p.l === null || p.b === null) {
        expect([place, galactic]).toEqual([null, null]);
        continue;
      }
      expect(separation(place!, { lon: p.lon, lat: p.lat })).toBeLessThan(1e-10);
      expect(separation({ lon: galactic!.l, lat: galactic!.b }, { lon: p.l, lat: p.b })).toBeLessThan(1e-10);
    }
    for (const p of header.inverse) {
      const pixel = sky.galacticToPixel(p.l, p.b);
      if (p.x === null || p.y === null) expect(pixel).toBeNull();
      else expect(Math.hypot(pixel!.x - p.x, pixel!.y - p.y)).toBeLessThan(1e-6);
    }
  });
});

describe('describeImage', () => {
  it('says all that is needed to read the image', () => {
    const head = describeWith({}, 2880 + 8 * 7 * 4);
    expect(head).toMatchObject({
      shape: { nx: 8, ny: 7 },
      hdu: 0,
      bitpix: -32,
      bscale: 1,
      bzero: 0,
      blank: null,
      unit: 'Rayleigh',
      object: 'Trial nebula',
      container: 'plain',
      dataOffset: 2880,
      dataBytes: 8 * 7 * 4,
      layout: { naxis: [8, 7], longitude: 0, latitude: 1 },
      frame: 'icrs',
      equinox: null,
      projection: 'TAN',
      cautions: [],
    });
    expect(head.cards).toContainEqual({ keyword: 'BUNIT', value: 'Rayleigh', comment: '' });
    const at = buildSky(head.sky).pixelToSky(3, 3)!;
    expect(at.lon).toBeCloseTo(53.5, 12);
    expect(at.lat).toBeCloseTo(48.25, 12);
  });

  it('takes the sky axes in any order, and other axes of length one anywhere', () => {
    const head = describeWith({
      NAXIS: '4',
      NAXIS1: '1',
      NAXIS2: '7',
      NAXIS3: '1',
      NAXIS4: '8',
      CTYPE1: "'STOKES'",
      CTYPE2: "'GLAT-CAR'",
      CTYPE3: "'VRAD'",
      CTYPE4: "'GLON-CAR'",
      CRVAL2: '0.0',
      CRVAL4: '120.0',
      CRPIX4: '1.0',
      CDELT4: '-0.1',
    });
    expect(head.shape).toEqual({ nx: 8, ny: 7 });
    expect(head.layout).toEqual({ naxis: [1, 7, 1, 8], longitude: 3, latitude: 1 });
    const place = buildSky(head.sky).pixelToGalactic(2, 5)!;
    expect(place.l).toBeCloseTo(119.8, 12);
    expect(place.b).toBeCloseTo(0.1, 12);
  });

  it.each([
    ['no BUNIT', { BUNIT: null }, /no unit/],
    ['no CRPIX2', { CRPIX2: null }, /CRPIX2 is missing; it is 0/],
    ['no CDELT1', { CDELT1: null }, /CDELT1 is missing; it is 1/],
    ['BLANK on floats', { BLANK: '-1' }, /floating-point/],
    ['J2000', { EQUINOX: "'J2000.0'" }, /read as 2000/],
  ])('cautions about %s', (_what, changes, sentence) => {
    expect(describeWith(changes).cautions.join('\n')).toMatch(sentence);
  });

  it('says nothing about velocities, which an image has none of', () => {
    const { cautions } = describeWith({ NAXIS: '3', NAXIS3: '1', CTYPE3: "'FREQ'" });
    expect(cautions).toEqual([]);
  });

  const CUBE = { NAXIS: '3', NAXIS3: '64', CTYPE3: "'VRAD'" };
  it.each([
    ['a cube', CUBE, 'NAXIS3', /This is a cube: its spectral axis \(axis 3\) has 64 channels\. Upload it/],
    ['Stokes planes', { ...CUBE, CTYPE3: "'STOKES'" }, 'NAXIS3', /Axis 3 \(STOKES\) has 64 planes/],
    ['planes without a name', { ...CUBE, CTYPE3: null }, 'NAXIS3', /Axis 3 \(unnamed\) has 64 planes/],
    ['a slice in velocity', { CTYPE2: "'VRAD'" }, 'CTYPE1', /No axis is a latitude/],
    [
      'a slice in velocity that keeps its latitude',
      { NAXIS: '3', NAXIS3: '1', CTYPE2: "'VRAD'", CTYPE3: "'DEC--TAN'" },
      'CTYPE2',
      /has 7 pixels and is no sky axis/,
    ],
    ['a table', { SIMPLE: null, XTENSION: "'BINTABLE'" }, 'XTENSION', /table/],
    ['no image', { NAXIS: '0' }, 'NAXIS', /no image/],
    ['random groups', { GROUPS: 'T', NAXIS1: '0' }, 'GROUPS', /groups/],
  ])('refuses %s, and says what it is', (_what, changes, card, words) => {
    expect(refusal(changes)).toMatchObject({
      type: 'fits-image',
      extra: { card },
      detail: expect.stringMatching(words),
    });
  });

  it.each([
    ['CTYPE1', { CTYPE1: "'RA---QQQ'", CTYPE2: "'DEC--QQQ'" }],
    ['CTYPE2', { CTYPE2: "'GLAT-TAN'" }],
    ['CTYPE2', { CTYPE2: "'DEC--SIN'" }],
    ['CTYPE2', { CTYPE2: "'ELAT-TAN'" }],
    ['CDELT2', { CDELT2: '0.0' }],
    ['PC1_3', { NAXIS: '3', NAXIS3: '1', PC1_3: '0.5' }],
    ['CD1_1', { CD1_1: '0.1', CD1_2: '0.1', CD2_1: '0.1', CD2_2: '0.1' }],
    ['BITPIX', { BITPIX: '12' }],
    ['BSCALE', { BSCALE: '0.0' }],
    ['NAXIS1', { NAXIS1: '0' }],
    ['RADESYS', { RADESYS: "'GAPPT'" }],
  ])('refuses, naming %s, with %j', (card, changes) => {
    expect(refusal(changes)).toMatchObject({ type: 'fits-card', extra: { card } });
  });

  it('names the bytes a file lacks', () => {
    expect(refusal({}, 2880 + 8 * 7 * 4 - 10)).toMatchObject({
      type: 'fits-truncated',
      extra: { missingBytes: 10 },
    });
  });
});
