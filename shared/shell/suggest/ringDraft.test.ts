import { positionAngle, separation } from '@/shared/sky/greatCircle';
import {
  markAngles,
  MARKS,
  ringPlaces,
  ringThrough,
  seenArcs,
  sigmaFactor,
  withErased,
  withMarks,
  withTheta,
} from '@/shared/shell/suggest/ringDraft';

const centre = { lon: 359.5, lat: 62 };
const draft = ringThrough(centre, { lon: 4, lat: 63 });

test('a circle goes through its rim, and its marks lie on it at great-circle distance, evenly', () => {
  expect(draft.theta).toBeCloseTo(separation(centre, { lon: 4, lat: 63 }), 12);
  const places = ringPlaces(draft);
  expect(places).toHaveLength(8);
  for (const place of places) expect(separation(centre, place)).toBeCloseTo(draft.theta, 10);
  expect(positionAngle(centre, places[0]!)).toBeCloseTo(draft.handle, 8);
  const angles = markAngles(draft);
  expect((angles[1]! - angles[0]! + 360) % 360).toBeCloseTo(45, 8);
});

test('a circle weighs as much whatever number of marks it becomes, in proportion to what of it is seen', () => {
  const weight = (d: typeof draft) => d.marks / sigmaFactor(d) ** 2;
  for (const marks of [6, 8, 16]) expect(weight(withMarks(draft, marks))).toBeCloseTo(MARKS.usual, 9);
  const half = withErased(draft, 2, 178, true); // 36 of 72 sectors
  for (const marks of [6, 16]) expect(weight(withMarks(half, marks))).toBeCloseTo(MARKS.usual / 2, 9);
});

test('marks keep to what is seen, and as many of them as wished', () => {
  const part = withErased(draft, 350, 100, true); // the shorter way, through north
  expect(seenArcs(part)).toEqual([{ from: 105, to: 350 }]);
  for (const marks of [6, 8, 16]) {
    const angles = markAngles(withMarks(part, marks));
    expect(angles).toHaveLength(marks);
    for (const angle of angles) expect(angle > 105 && angle < 350).toBe(true);
  }
  const two = withErased(part, 200, 215, true);
  expect(seenArcs(two)).toEqual([
    { from: 105, to: 200 },
    { from: 220, to: 350 },
  ]);
  expect(markAngles(two).some((a) => a > 200 && a < 220)).toBe(false);
  expect(withErased(withErased(two, 200, 215, false), 100, 350, false).erased.includes(true)).toBe(false);
});

test('a circle all erased makes no marks; numbers stay within their bounds', () => {
  const none = withErased(withErased(draft, 0, 175, true), 180, 355, true);
  expect(ringPlaces(none)).toEqual([]);
  expect(withMarks(draft, 99).marks).toBe(MARKS.most);
  expect(withMarks(draft, 1).marks).toBe(MARKS.least);
  expect(withTheta(draft, -3).theta).toBeGreaterThan(0);
  expect(withErased(draft, 10, 20, false)).toBe(draft);
});
