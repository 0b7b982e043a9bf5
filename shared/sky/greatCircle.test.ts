import fc from 'fast-check';
import reference from '@/tests/reference/greatCircles.json';
import {
  destination,
  eastNorth,
  lonLatOf,
  positionAngle,
  separation,
  unitVector,
  type Vector,
} from '@/shared/sky/greatCircle';

const dot = (a: Vector, b: Vector) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
const point = fc.record({
  lon: fc.double({ min: 0, max: 360, noNaN: true }),
  lat: fc.double({ min: -90, max: 90, noNaN: true }),
});

describe('against 40-digit values', () => {
  test.each(reference.separations.map((s) => [s.id, s.note, s] as const))('%s %s', (_id, _note, s) => {
    const found = separation(s.a, s.b);
    const tolerance = s.separationArcsec < 1 ? 1e-9 * s.separationDeg : 1e-12;
    expect(Math.abs(found - s.separationDeg)).toBeLessThanOrEqual(tolerance);
    const angleTolerance = 1e-12 / Math.sin((s.separationDeg * Math.PI) / 180) + 1e-12; // blind near the antipode
    for (const [expected, angle] of [
      [s.positionAngleAtA, positionAngle(s.a, s.b)],
      [s.positionAngleAtB, positionAngle(s.b, s.a)],
    ] as const) {
      if (expected === null) continue;
      const off = Math.abs(((angle - expected + 540) % 360) - 180);
      expect(off).toBeLessThanOrEqual(angleTolerance);
    }
  });

  test.each(reference.destinations.map((d) => [d.id, d.note, d] as const))('%s %s', (_id, _note, d) => {
    const to = destination(d.from, d.positionAngle, d.distanceDeg);
    expect(separation(to, { lon: d.to.lon ?? to.lon, lat: d.to.lat })).toBeLessThan(1e-12);
  });
});

describe('properties', () => {
  test('a vector and back is the same point', () => {
    fc.assert(
      fc.property(point, (p) => {
        expect(separation(p, lonLatOf(unitVector(p)))).toBeLessThan(1e-13);
      }),
    );
  });

  test('east, north and the point are orthonormal and right-handed, at the poles too', () => {
    const check = (n: Vector) => {
      const { east, north } = eastNorth(n);
      for (const [a, b, value] of [
        [east, east, 1],
        [north, north, 1],
        [east, north, 0],
        [east, n, 0],
        [north, n, 0],
      ] as const)
        expect(dot(a, b)).toBeCloseTo(value, 12);
      expect(n[0] * (east[1] * north[2] - east[2] * north[1])).toBeCloseTo(n[0] * n[0], 12);
    };
    fc.assert(fc.property(point, (p) => check(unitVector(p))));
    check([0, 0, 1]);
    check([0, 0, -1]);
  });

  test('a destination lies at its distance and direction', () => {
    const angle = fc.double({ min: 0, max: 359.999, noNaN: true });
    const distance = fc.double({ min: 1e-6, max: 179, noNaN: true });
    const away = point.filter((p) => Math.abs(p.lat) < 89.9);
    fc.assert(
      fc.property(away, angle, distance, (from, pa, d) => {
        const to = destination(from, pa, d);
        expect(Math.abs(separation(from, to) - d)).toBeLessThan(1e-12);
        const off = Math.abs(((positionAngle(from, to) - pa + 540) % 360) - 180);
        expect(off * Math.sin((d * Math.PI) / 180)).toBeLessThan(1e-11);
      }),
    );
  });

  test('separation is symmetric and blind to full turns of longitude', () => {
    fc.assert(
      fc.property(point, point, (a, b) => {
        expect(separation(a, b)).toBeCloseTo(separation(b, a), 12);
        expect(separation(a, { lon: b.lon - 360, lat: b.lat })).toBeCloseTo(separation(a, b), 11);
      }),
    );
  });
});
