import fc from 'fast-check';
import vectors from '@/tests/reference/wcs-vectors.json';
import mixed from '@/tests/reference/wcs-mixed.json';
import marked from '@/tests/reference/cube-marks.json';
import { headerBytesOf } from '@/tests/reference/headerBytes';
import { describeCube } from '@/shared/fits/cubeHead';
import { separation } from './greatCircle';
import { spectralAxis } from './spectralAxis';
import { buildWcs } from './wcs';
import { WcsError, type WcsSpec } from './wcsSpec';

/** As the browser gets it: through JSON. */
const through = (spec: WcsSpec): WcsSpec => JSON.parse(JSON.stringify(spec)) as WcsSpec;
const wcsOf = (cards: string[]) => buildWcs(through(describeCube(headerBytesOf(cards)).wcs));

describe.each(vectors.headers)('$id: $kind', (header) => {
  const head = describeCube(headerBytesOf(header.cards));
  const wcs = buildWcs(through(head.wcs));

  it('names frame, projection and spectral axis', () => {
    expect(head.frame).toBe(header.frame);
    expect(head.equinox).toBe(header.equinox);
    expect(head.projection).toBe(header.projection);
    expect(head.spectral.type).toBe(header.spectralType);
    expect(head.spectral.convention).toBe(header.convention);
    expect(head.spectral.frame).toBe(header.specsys);
    expect(head.spectral.restFrequencyHz).toBe(header.restFrequencyHz);
  });

  it('gives the reference positions to 1e-10 deg and velocities to 1e-9 km/s', () => {
    for (const p of header.pixels) {
      const sky = wcs.pixelToSky(p.x, p.y);
      const galactic = wcs.pixelToGalactic(p.x, p.y);
      if (p.lon === null || p.lat === null || p.l === null || p.b === null) {
        expect([sky, galactic]).toEqual([null, null]);
      } else {
        expect(separation(sky!, { lon: p.lon, lat: p.lat })).toBeLessThan(1e-10);
        expect(separation({ lon: galactic!.l, lat: galactic!.b }, { lon: p.l, lat: p.b })).toBeLessThan(
          1e-10,
        );
        const back = wcs.skyToPixel(sky!.lon, sky!.lat)!;
        expect(Math.hypot(back.x - p.x, back.y - p.y)).toBeLessThan(1e-8);
      }
      expect(Math.abs(wcs.velocityOf(p.channel) - p.velocity)).toBeLessThan(1e-9);
      const hz = wcs.frequencyHzOf(p.channel);
      if (p.frequencyHz === null) expect(hz).toBeNull();
      else expect(Math.abs(hz! / p.frequencyHz - 1)).toBeLessThan(1e-13);
    }
  });

  it('finds the pixels of reference places', () => {
    for (const p of header.inverse) {
      const pixel = wcs.galacticToPixel(p.l, p.b);
      if (p.x === null || p.y === null) expect(pixel).toBeNull();
      else expect(Math.hypot(pixel!.x - p.x, pixel!.y - p.y)).toBeLessThan(1e-6);
      expect(Math.abs(wcs.channelOf(p.velocity) - p.channel)).toBeLessThan(1e-6);
    }
  });

  it('comes back within 1e-9 deg from anywhere on the image', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -0.5, max: 47.5, noNaN: true }),
        fc.double({ min: -0.5, max: 39.5, noNaN: true }),
        (x, y) => {
          const place = wcs.pixelToGalactic(x, y);
          if (place === null) return;
          const pixel = wcs.galacticToPixel(place.l, place.b)!;
          const again = wcs.pixelToGalactic(pixel.x, pixel.y)!;
          expect(separation({ lon: again.l, lat: again.b }, { lon: place.l, lat: place.b })).toBeLessThan(
            1e-9,
          );
        },
      ),
      { numRuns: 40 },
    );
  });
});

it.each(mixed.headers)('agrees with wcslib: $title', ({ cards, places }) => {
  const { wcs: spec } = describeCube(headerBytesOf(cards));
  const wcs = buildWcs(through(spec));
  const { valueOf } = spectralAxis(spec.spectral);
  for (const [x, y, channel, lon, lat, l, b, value] of places) {
    const sky = wcs.pixelToSky(x!, y!);
    if (lon === null || lon === undefined) expect(sky).toBeNull();
    else {
      expect(separation(sky!, { lon, lat: lat! })).toBeLessThan(1e-10);
      const galactic = wcs.pixelToGalactic(x!, y!)!;
      expect(separation({ lon: galactic.l, lat: galactic.b }, { lon: l!, lat: b! })).toBeLessThan(1e-10);
      const back = wcs.galacticToPixel(galactic.l, galactic.b)!;
      expect(Math.hypot(back.x - x!, back.y - y!)).toBeLessThan(1e-7);
    }
    if (value !== null) expect(Math.abs(valueOf(channel!) / value! - 1)).toBeLessThan(1e-12);
  }
});

describe.each(marked.cubes)('marks on cube $name', ({ cards, marks }) => {
  it('lie where the reference says, to 1e-8 deg and 1e-6 km/s', () => {
    const wcs = wcsOf(cards);
    for (const m of marks) {
      const { l, b } = wcs.pixelToGalactic(m.x, m.y)!;
      expect(separation({ lon: l, lat: b }, { lon: m.l, lat: m.b })).toBeLessThan(1e-8); // given to nine decimals
      expect(Math.abs(wcs.velocityOf(m.channel) - m.velocity)).toBeLessThan(1e-6);
    }
  });
});

describe('buildWcs', () => {
  const spec = (): WcsSpec => structuredClone(describeCube(headerBytesOf(marked.cubes[2]!.cards)).wcs);

  it('refuses a singular matrix, an unknown projection and a step of zero, naming the card', () => {
    const broken = [spec(), spec(), spec()] as const;
    broken[0].sky.matrix = [1, 2, 2, 4];
    broken[1].sky.projection = 'ZZZ';
    broken[2].spectral.step = 0;
    const cards = broken.map((s) => {
      try {
        buildWcs(s);
        return 'accepted';
      } catch (error) {
        return (error as WcsError).card;
      }
    });
    expect(cards).toEqual(['CD', 'CTYPE', 'CDELT']);
  });

  it('goes round a pole and across longitude 0', () => {
    for (const reference of [
      [359.99, 0.2],
      [10, 90],
      [10, -90],
      [123, 89.99],
    ] as [number, number][]) {
      const s = spec();
      s.sky.reference = reference;
      const wcs = buildWcs(s);
      for (const [x, y] of [
        [0, 0],
        [63.5, 63.5],
        [127, 3],
        [63.5, 63.4999],
      ] as const) {
        const { lon, lat } = wcs.pixelToSky(x, y)!;
        expect(lon).toBeGreaterThanOrEqual(0);
        expect(lon).toBeLessThan(360);
        const back = wcs.skyToPixel(lon, lat)!;
        expect(Math.hypot(back.x - x, back.y - y)).toBeLessThan(1e-7);
      }
    }
  });

  it('gives the typical distance of channels as the velocity step', () => {
    expect(wcsOf(marked.cubes[0]!.cards).velocityStep).toBeCloseTo(1.03, 12);
    expect(wcsOf(marked.cubes[1]!.cards).velocityStep).toBeCloseTo(1.25, 12);
    expect(wcsOf(marked.cubes[2]!.cards).velocityStep).toBeCloseTo(1.6, 9);
  });
});
