import fc from 'fast-check';
import { GUIDE } from '@/components/guide/guideSteps';
import { placeCard } from '@/components/guide/placeCard';
import { pageRows, pagesOf } from '@/components/ui/Pager';

test('a card is whole on the page wherever its control lies', () => {
  const side = (least: number, most: number) => fc.integer({ min: least, max: most });
  fc.assert(
    fc.property(
      side(0, 2000),
      side(0, 1400),
      side(10, 2000),
      side(10, 1400),
      side(360, 2560),
      side(380, 1440),
      (left, top, width, height, w, h) => {
        const card = { width: 320, height: 220 };
        const at = placeCard({ left, top, width, height }, card, { width: w, height: h });
        expect(at.left).toBeGreaterThanOrEqual(0);
        expect(at.top).toBeGreaterThanOrEqual(0);
        expect(at.left + card.width).toBeLessThanOrEqual(w);
        expect(at.top + card.height).toBeLessThanOrEqual(h);
      },
    ),
  );
});

test('a card stands beside its control where there is room', () => {
  const page = { width: 1440, height: 900 };
  const card = { width: 320, height: 200 };
  const strip = { left: 272, top: 760, width: 820, height: 104 };
  expect(placeCard(strip, card, page).top + card.height).toBeLessThan(strip.top);
  const map = { left: 272, top: 100, width: 820, height: 640 };
  const at = placeCard({ ...map, height: 780 }, card, page);
  expect(at.left).toBeGreaterThan(map.left + map.width);
});

test('the guide has five short cards', () => {
  expect(GUIDE).toHaveLength(5);
  for (const { text } of GUIDE) expect(text.split(' ').length).toBeLessThanOrEqual(40);
});

test('rows of a page; a page that there is not shows the nearest', () => {
  const rows = Array.from({ length: 120 }, (_, i) => i);
  expect(pagesOf(120)).toBe(3);
  expect(pagesOf(0)).toBe(1);
  expect(pageRows(rows, 3)).toEqual({ rows: rows.slice(100), page: 3 });
  expect(pageRows(rows, 9).page).toBe(3);
  expect(pageRows(rows, NaN)).toEqual({ rows: rows.slice(0, 50), page: 1 });
  expect(pageRows(rows, -2).page).toBe(1);
});
