import { graticule } from '@/shared/image/graticule';
import { ringPath, type Project } from '@/shared/image/skyPath';
import { fitted } from '@/shared/image/viewport';
import { separation } from '@/shared/sky/greatCircle';

/** A plain map of the sky: longitude to the left, 10 pixels a degree, longitude 0 in the middle. */
const unproject = (x: number, y: number) => ({
  lon: ((((100 - x) / 10) % 360) + 360) % 360,
  lat: (y - 100) / 10,
});
const project: Project = ({ lon, lat }) => ({ x: 100 - 10 * (((lon + 180) % 360) - 180), y: 100 + 10 * lat });

test('every point of a ring lies at its distance, and the ring closes', () => {
  const centre = { lon: 3, lat: 4 };
  const [ring, ...rest] = ringPath(centre, 2.5, project, 100);
  expect(rest).toEqual([]);
  for (const { x, y } of ring!) expect(separation(centre, unproject(x, y))).toBeCloseTo(2.5, 9);
  expect(ring![0]).toEqual(ring![ring!.length - 1]);
});

test('a ring is cut where nothing is shown and where the map jumps', () => {
  const seen: Project = (p) => (p.lat > 4 ? null : project(p));
  const cut = ringPath({ lon: 3, lat: 4 }, 2.5, seen, 100);
  expect(cut.flat().every(({ y }) => y <= 140)).toBe(true);
  expect(cut.flat().length).toBeLessThan(
    0.55 * ringPath({ lon: 3, lat: 4 }, 2.5, project, 100).flat().length,
  );
  const seam = ringPath({ lon: 180, lat: 0 }, 5, project, 1000);
  expect(seam.length).toBeGreaterThan(1);
});

test('lines of round coordinates across longitude 0, with labels at the edges', () => {
  const v = fitted(201, 201, 402, 402);
  const lines = graticule(v, { project, unproject }, 'decimal', 100);
  const lons = lines.filter((l) => l.axis === 'lon').map((l) => l.label);
  expect(lons).toEqual(['350°', '355°', '0°', '5°', '10°']);
  const lats = lines.filter((l) => l.axis === 'lat');
  expect(lats.map((l) => l.label)).toEqual(['−10°', '−5°', '0°', '5°', '10°']);
  expect(lats[2]!.labelAt).toEqual({ sx: 0, sy: 201 });
  const zero = lines.find((l) => l.label === '0°' && l.axis === 'lon')!;
  expect(zero.labelAt!.sx).toBeCloseTo(201, 6);
  expect(zero.labelAt!.sy).toBeCloseTo(402, 6);
});

test('a map that shows no sky has no lines', () => {
  expect(graticule(fitted(20, 20, 40, 40), { project: () => null, unproject: () => null })).toEqual([]);
});
