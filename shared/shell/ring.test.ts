import fc from 'fast-check';
import reference from '@/tests/reference/circles.json';
import { destination, separation } from '@/shared/sky/greatCircle';
import { algebraicRing, fitRing, ringRadius } from '@/shared/shell/ring';

const marksOf = (points: number[][]) => points.map(([l, b]) => ({ l: l!, b: b! }));

describe('against scipy solutions polished to 40 digits', () => {
  test.each(reference.circles.map((c) => [c.id, c.note, c] as const))('%s %s', (_id, _note, c) => {
    const { ring } = fitRing(marksOf(c.points));
    const plane = algebraicRing(marksOf(c.points))!;
    expect(separation({ lon: plane.l, lat: plane.b }, { lon: c.plane.l, lat: c.plane.b })).toBeLessThan(1e-9);
    expect(Math.abs(plane.theta - c.plane.radius)).toBeLessThan(1e-9);
    const g = c.geometric;
    const tolerance = 1e-8; // deg; 4e-13 is found
    expect(separation({ lon: ring!.l, lat: ring!.b }, { lon: g.l, lat: g.b })).toBeLessThan(tolerance);
    expect(Math.abs(ring!.theta - g.radius)).toBeLessThan(tolerance);
    expect(Math.abs(ring!.rms - g.rms)).toBeLessThan(tolerance);
    for (const [mine, theirs] of [
      [ring!.se, g.seRadius],
      [ring!.seEast, g.seEast],
      [ring!.seNorth, g.seNorth],
    ] as const) {
      if (theirs === null) expect(mine).toBeNull();
      else expect(Math.abs(mine! / theirs - 1)).toBeLessThan(1e-3);
    }
  });
});

test('points on a circle anywhere give that circle back', () => {
  fc.assert(
    fc.property(
      fc.double({ min: 0, max: 360, noNaN: true }),
      fc.double({ min: -90, max: 90, noNaN: true }),
      fc.double({ min: 0.05, max: 40, noNaN: true }),
      fc.double({ min: 60, max: 360, noNaN: true }),
      (l, b, theta, arc) => {
        const centre = { lon: l, lat: b };
        const points = [0, 0.2, 0.45, 0.7, 1].map((f) => destination(centre, f * arc * 0.9, theta));
        const { ring } = fitRing(points.map(({ lon, lat }) => ({ l: lon, b: lat })));
        expect(Math.abs(ring!.theta - theta)).toBeLessThan(1e-9);
        expect(separation(centre, { lon: ring!.l, lat: ring!.b })).toBeLessThan(1e-9);
      },
    ),
  );
});

test('stated errors weight the marks and set the error of the radius', () => {
  const points = [0, 60, 120, 180, 240, 300].map((pa) => destination({ lon: 40, lat: 8 }, pa, 2));
  const withSigma = (sigma: number) => points.map(({ lon, lat }) => ({ l: lon, b: lat, sigma }));
  const { ring } = fitRing(withSigma(0.06));
  expect(ring!.se).toBeCloseTo(0.06 / Math.sqrt(6), 6);
  expect(fitRing(withSigma(0.12)).ring!.se).toBeCloseTo(2 * ring!.se!, 8);
});

test('what is no circle is named', () => {
  const at = (l: number, b: number) => ({ l, b });
  expect(fitRing([at(10, 0), at(11, 0)])).toEqual({ ring: null, reason: 'too-few' });
  expect(fitRing([at(10, 5), at(10, 5), at(10, 5)])).toEqual({ ring: null, reason: 'same-point' });
  expect(fitRing([at(10, 0), at(11, 0), at(12, 0), at(13, 0)]).ring).toBeNull();
  expect(fitRing([at(30, 1), at(30, 2), at(30, 4)])).toEqual({ ring: null, reason: 'straight-line' });
});

test('the plain radius is widest at v_sys and closes at the caps', () => {
  const shell = { theta: 12, vSys: -40, vExp: 15 };
  expect(ringRadius(-40, shell)).toBeCloseTo(12, 12);
  expect(ringRadius(-25, shell)).toBeCloseTo(0, 12);
  expect(ringRadius(-24.9, shell)).toBeNull();
  expect(ringRadius(-31, shell)).toBeCloseTo(ringRadius(-49, shell)!, 12);
});
