import {
  firstSlice,
  handlesOf,
  moved,
  outlines,
  placeAlong,
  sliceOfText,
  sliceText,
  type Slice,
} from '@/components/slices/slice';
import { separation } from '@/shared/sky/greatCircle';

const slices: Slice[] = [
  { kind: 'segment', l: 10, b: -3, toL: 12.5, toB: 1 },
  { kind: 'ring', l: 359, b: 2, radius: 1.5 },
  { kind: 'spectrum', l: 100, b: 60, radius: 0.4, inner: 0.2 },
];

test.each(slices)('$kind goes into the address and comes back', (slice) =>
  expect(sliceOfText(sliceText(slice)!)).toEqual(slice),
);

test.each(['', 'segment,1,2,3', 'ring,1,2,-1', 'ring,1,95,2', 'spectrum,1,2,3,4', 'ring,a,2,3', 'ring,,2,3'])(
  '"%s" is no slice',
  (text) => expect(sliceOfText(text)).toBeNull(),
);

test('a centre takes its ring along, a rim changes the radius, ends of a segment never meet', () => {
  const ring = slices[1]!;
  expect(moved(ring, 0, { lon: 3, lat: 1 })).toEqual({ kind: 'ring', l: 3, b: 1, radius: 1.5 });
  expect((moved(ring, 1, { lon: 359, lat: 4.5 }) as { radius: number }).radius).toBeCloseTo(2.5, 9);
  const segment = slices[0]!;
  expect(moved(segment, 1, { lon: 10, lat: -3 })).toBe(segment);
  expect(handlesOf(segment).map((h) => h.at)).toEqual([
    { lon: 10, lat: -3 },
    { lon: 12.5, lat: 1 },
  ]);
});

test('the drawn line is the line that is cut', () => {
  for (const slice of slices.slice(0, 2) as Exclude<Slice, { kind: 'spectrum' }>[]) {
    const [line] = outlines(slice);
    const half = placeAlong(slice, 0.5);
    expect(Math.min(...line!.map((p) => separation(p, half)))).toBeLessThan(1e-9);
  }
});

test('the first slice lies about the model', () => {
  const first = firstSlice('segment', { lon: 30, lat: 0 }, 2, 5) as Extract<Slice, { kind: 'segment' }>;
  expect(first.l).toBeCloseTo(32.8, 1);
  expect(first.toL).toBeCloseTo(27.2, 1);
});
