import { cardValue, searchCards } from '@/components/about/headerSearch';

const cards = [
  { keyword: 'SIMPLE', value: true, comment: 'file conforms' },
  { keyword: 'CRVAL1', value: 118.25, comment: '[deg] reference value' },
  { keyword: 'CTYPE1', value: 'GLON-CAR', comment: null },
  { keyword: 'HISTORY', value: null, comment: 'smoothed to 9 arcmin' },
];
const found = (text: string) => searchCards(cards, text).map(({ index }) => index);

test('every word must be somewhere on the card', () => {
  expect(found('')).toEqual([0, 1, 2, 3]);
  expect(found('glon')).toEqual([2]);
  expect(found('crval DEG')).toEqual([1]);
  expect(found('9 arc')).toEqual([3]);
  expect(found('crval nothing')).toEqual([]);
});

test('values read as the file means them', () => {
  expect(cards.map(cardValue)).toEqual(['T', '118.25', 'GLON-CAR', '']);
});
