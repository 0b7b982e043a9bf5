import { ringRadius } from '@/shared/shell/ring';
import { drawColumns, percentile, radiusBand } from './drawColumns';

const names = ['vExp', 'l', 'positionAngle', 'vSys'];
const draws = {
  names,
  rows: [
    [10, 359.9, 179, -40],
    [null, 0.1, 1, -40],
    [12, 0.3, 2, -40],
  ],
};
const fitted: Record<string, number> = { vExp: 11, l: 0, positionAngle: 0, vSys: -40 };

test('longitudes and angles lie about the fitted value, and unbounded draws are counted', () => {
  const columns = drawColumns(draws, (name) => fitted[name]);
  expect(columns.map((c) => c.name)).toEqual(['l', 'vExp', 'positionAngle']);
  const [l, vExp, angle] = columns;
  expect(l!.values.map((v) => Number(v!.toFixed(6)))).toEqual([-0.1, 0.1, 0.3]);
  expect(angle!.values).toEqual([-1, 1, 2]);
  expect(vExp).toMatchObject({ values: [10, null, 12], unbounded: 1 });
});

test('a parameter that was held has no column', () =>
  expect(drawColumns(draws, (name) => fitted[name]).map((c) => c.name)).not.toContain('vSys'));

test('percentiles count unbounded draws as the largest', () => {
  expect(percentile([1, 2, 3, 4, 5], 0.5)).toBe(3);
  expect(percentile([1, 2], 0.25)).toBe(1.25);
  expect(percentile([1, null, 3, null], 0.25)).toBe(2.5);
  expect(percentile([1, null, 3, null], 0.84)).toBeNull();
  expect(percentile([], 0.5)).toBeNull();
});

test('the band holds the curve, is 0 beyond the caps, and Θ where v_exp has no bound', () => {
  const rows = Array.from({ length: 41 }, (_, i) => [2 + (i - 20) * 0.01, -40, 10 + (i - 20) * 0.05]);
  const band = radiusBand({ names: ['theta', 'vSys', 'vExp'], rows })!;
  const [low, high] = band(-35);
  const middle = ringRadius(-35, { theta: 2, vSys: -40, vExp: 10 })!;
  expect(low).toBeLessThan(middle);
  expect(high).toBeGreaterThan(middle);
  expect(band(-20)).toEqual([0, 0]);
  const open = rows.map(([theta, vSys]) => [theta!, vSys!, null]);
  expect(radiusBand({ names: ['theta', 'vSys', 'vExp'], rows: open })!(100)[1]).toBeCloseTo(2.137, 2);
  expect(radiusBand({ names: ['l'], rows })).toBeNull();
});
