import { paramsOf, placeOf, type CubePlace } from '@/components/cube/place';
import { AS_IS } from '@/components/seeing/seeing';

const nothing: CubePlace = {
  channel: null,
  shell: null,
  map: null,
  view: null,
  mark: null,
  palette: null,
  tone: null,
  window: null,
  seeing: AS_IS,
};

test('a place goes into the address and comes back', () => {
  const place: CubePlace = {
    channel: 19,
    shell: 'a-b',
    map: 'velocity',
    view: { x: 200.5, y: 311, zoom: 2.5 },
    mark: 3,
    palette: 'Tide',
    tone: 'arcsinh',
    window: [-2.5, 27],
    seeing: { ...AS_IS, mean: 3, less: 20 },
  };
  const params = paramsOf(place);
  expect(params).toMatchObject({
    ch: '19',
    zoom: '2.5',
    x: '200.5',
    low: '-2.5',
    palette: 'Tide',
    map: 'velocity',
  });
  expect(placeOf(params)).toEqual(place);
});

test('what is as usual is not said', () => {
  expect(
    Object.values(paramsOf({ ...nothing, view: { x: 1, y: 2, zoom: 1 } })).every((v) => v === undefined),
  ).toBe(true);
  expect(placeOf({})).toEqual(nothing);
});

test('nonsense is as if it were not given', () => {
  expect(
    placeOf({
      ch: '-3',
      map: 'channel',
      zoom: '0',
      x: 'a',
      y: '1',
      mark: '1.5',
      palette: 'rainbow',
      tone: 'x',
      low: '5',
      high: '5',
    }),
  ).toEqual(nothing);
  expect(placeOf({ ch: ['7', '8'] }).channel).toBe(7);
});
