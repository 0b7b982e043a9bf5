import type { FrozenMarks } from '@/shared/contract/fits';
import type { DoneFit } from './fitFacts';
import { residualPlaces, residualWords } from './residualPlaces';

const p = (value: number) => ({ value, se: 0, lo: null, hi: null, unit: 'deg' });
const fit = (l: number, b: number) =>
  ({
    parameters: { l: p(l), b: p(b) },
    residuals: [
      { mark: 0, degrees: 0.1, weight: 1 },
      { mark: 1, degrees: -0.2, weight: 1 },
      { mark: 2, degrees: 0.9, weight: 0 },
    ],
  }) as unknown as DoneFit;
const frozen = (places: [number, number][]) =>
  ({ marks: places.map(([l, b]) => ({ l, b })) }) as unknown as FrozenMarks;

test('marks lie along great circles about the centre, also across longitude nought', () => {
  const [east, north] = residualPlaces(
    fit(359.5, 0),
    frozen([
      [0.5, 0],
      [359.5, 2],
      [358, 0],
    ]),
  );
  expect(east!.east).toBeCloseTo(1, 9);
  expect(east!.north).toBeCloseTo(0, 9);
  expect(north!.north).toBeCloseTo(2, 9);
});

test('a degree of longitude far from the plane is less than a degree on the sky', () => {
  const [east] = residualPlaces(fit(10, 60), frozen([[12, 60]]));
  expect(Math.hypot(east!.east, east!.north)).toBeCloseTo(1, 2);
});

test('the words count marks in the fit alone', () => {
  const places = residualPlaces(
    fit(10, 0),
    frozen([
      [11, 0],
      [10, 1],
      [9, 0],
    ]),
  );
  expect(residualWords(places)).toBe(
    '1 marks lie outside the model and 1 inside; on average north 0.20 degrees inside, east 0.10 degrees outside.',
  );
});
