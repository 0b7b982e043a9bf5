import fc from 'fast-check';
import reference from '@/tests/reference/frames.json';
import { fromGalactic, frameToGalactic, toGalactic } from './frames';
import { separation, unitVector } from './greatCircle';
import type { SkyFrame } from './wcsSpec';

const FRAMES = [
  ['icrs', 'icrs'],
  ['fk5', 'fk5'],
  ['fk4', 'fk4'],
  ['fk4NoETerms', 'fk4-no-e'],
  ['galactic', 'galactic'],
] as const;

describe.each(reference.conversions)('$id: $note', (row) => {
  it.each(FRAMES)('%s', (name, frame) => {
    // FK4 to galactic by its own definition and through FK5 differ by 7e-9 deg; the fk5 of such rows is the latter.
    const within = name === 'fk5' && row.given.startsWith('fk4') ? 1e-8 : 1e-11;
    const { l, b } = toGalactic(row[name], frame);
    expect(separation({ lon: l, lat: b }, row.galactic)).toBeLessThan(within);
    expect(separation(fromGalactic(row.galactic.lon, row.galactic.lat, frame), row[name])).toBeLessThan(
      within,
    );
  });
});

it('has the reference matrices', () => {
  const names = {
    icrsToGalactic: 'icrs',
    fk5J2000ToGalactic: 'fk5',
    fk4NoETermsB1950ToGalactic: 'fk4-no-e',
  } as const;
  for (const { name, rows } of reference.matrices) {
    const frame = names[name as keyof typeof names] as SkyFrame | undefined;
    if (!frame) continue;
    const { toGalactic: turn } = frameToGalactic(frame, null);
    const columns = [turn([1, 0, 0]), turn([0, 1, 0]), turn([0, 0, 1])];
    rows.forEach((row, i) => row.forEach((value, j) => expect(columns[j]![i]).toBeCloseTo(value, 15)));
  }
});

// astropy 5.2.1: SkyCoord(266, -29, unit='deg', frame=…).galactic
it.each([
  ['fk5', 1975, 359.9341218043666, -0.032290441208355454],
  ['fk5', 2015.5, 359.6526611562345, 0.45538199332208473],
  ['fk4', 1975, 359.93428513043176, -0.03257448541896015],
  ['fk4-no-e', 1930, 0.24631285784951135, -0.5744768362361335],
] as const)('%s of equinox %d', (frame, equinox, lon, lat) => {
  const { l, b } = toGalactic({ lon: 266, lat: -29 }, frame, equinox);
  expect(separation({ lon: l, lat: b }, { lon, lat })).toBeLessThan(1e-11);
});

it('comes back from every frame within 1e-12 deg, poles included', () => {
  const lat = fc.oneof(fc.double({ min: -90, max: 90, noNaN: true }), fc.constantFrom(-90, 90, 89.9999999));
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 360, noNaN: true }),
      lat,
      fc.constantFrom(...FRAMES),
      (lon, b, [, frame]) => {
        const sky = fromGalactic(lon, b, frame);
        const back = toGalactic(sky, frame);
        expect(separation({ lon: back.l, lat: back.b }, { lon, lat: b })).toBeLessThan(1e-12);
        expect(unitVector(sky).every(Number.isFinite)).toBe(true);
      },
    ),
  );
});
