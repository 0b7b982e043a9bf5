import { angleWords, AS_IS, paramsOfSeeing, seeingOf, type Seeing } from '@/components/seeing/seeing';

test('an address brings back what is seen', () => {
  const seen: Seeing = {
    mean: 5,
    beam: 4,
    less: 20.5,
    other: 34,
    minus: true,
    lie: 'polar',
    about: { lon: 118.2, lat: -3.1, reach: 2.4 },
    second: 'velocity',
    slice: { kind: 'ring', l: 12, b: 3, radius: 1.25 },
    contours: { of: '0b6ffd5e-6a35-4a0e-9f3b-0c5f1a2b3c4d', kind: 'total', count: 5, ends: [-2.5, 40] },
    layers: ['traced', 'shells'],
    marksOf: '1c6ffd5e-6a35-4a0e-9f3b-0c5f1a2b3c4d',
  };
  expect(seeingOf(paramsOfSeeing(seen))).toEqual(seen);
  expect(seeingOf(paramsOfSeeing({ ...AS_IS, other: 'model' }))).toEqual({ ...AS_IS, other: 'model' });
  expect(Object.values(paramsOfSeeing(AS_IS)).every((v) => v === undefined)).toBe(true);
});

test('what makes no sense is left out', () => {
  expect(seeingOf({})).toEqual(AS_IS);
  expect(seeingOf({ mean: '400', beam: '-2', less: 'wide', other: 'x', minus: '1', view: 'polar' })).toEqual(
    AS_IS,
  );
  expect(seeingOf({ view: 'polar', about: '10,95,3' })).toEqual(AS_IS);
  expect(seeingOf({ contours: 'not-an-id,total,5', second: 'all' })).toEqual(AS_IS);
  expect(seeingOf({ layers: 'all', marksof: 'x' })).toEqual(AS_IS);
  expect(seeingOf({ mean: '4' }).mean).toBe(5); // an odd number has a middle
  expect(seeingOf({ minus: '1', other: 'model' }).minus).toBe(false);
});

test('angles are said in the unit that suits them', () => {
  expect([4, 12.34, 120].map(angleWords)).toEqual(['4.0′', '12.3′', '2°']);
});
