import { destination } from '@/shared/sky/greatCircle';
import { ringAbout } from '@/shared/shell/ringAbout';

const centre = { l: 359.5, b: 62 };
const mark = (angle: number, radius: number, sigma?: number) => {
  const { lon, lat } = destination({ lon: centre.l, lat: centre.b }, angle, radius);
  return { l: lon, b: lat, sigma };
};

test('two marks and a centre give a radius, with its error from theirs', () => {
  const found = ringAbout(centre, [mark(20, 1.5, 0.1), mark(170, 1.8, 0.2)])!;
  expect(found.theta).toBeCloseTo((1.5 * 100 + 1.8 * 25) / 125, 10);
  expect(found.se).toBeCloseTo(Math.sqrt(1 / 125), 12);
});

test('without stated errors the scatter tells, if there is any to see', () => {
  const found = ringAbout(centre, [mark(20, 1.5), mark(170, 1.8)])!;
  expect(found.theta).toBeCloseTo(1.65, 10);
  expect(found.se).toBeCloseTo(0.15, 10);
  expect(ringAbout(centre, [mark(20, 1.5)])!.se).toBeNull();
  expect(ringAbout(centre, [])).toBeNull();
});
