import { modelRadius } from '@/shared/shell/channelCurve';
import { distanceField, modelPicture } from '@/shared/shell/modelPicture';

const sky = {
  pixelToGalactic: (x: number, y: number) => (x < 0 ? null : { l: 10 + x * 0.05, b: y * 0.05 - 2 }),
};
const shell = { theta: 1.5, vSys: 10, vExp: 12 };

test('the picture is brightest at the ring that the channel shows', () => {
  const field = distanceField(sky, { nx: 81, ny: 81 }, 1, { lon: 12, lat: 0 });
  for (const velocity of [10, 16, 1]) {
    const picture = modelPicture(field, velocity, 1, shell, 0.1);
    const row = picture.subarray(40 * 81, 41 * 81);
    let best = 40;
    for (let x = 40; x < 81; x++) if (row[x]! > row[best]!) best = x;
    expect(Math.abs((best - 40) * 0.05 - modelRadius(velocity, 1, shell)!)).toBeLessThan(0.03);
    expect(row[best]).toBeGreaterThan(0.9);
  }
});

test('beyond the caps there is nothing; in blocks distances are those of their middles', () => {
  const field = distanceField(sky, { nx: 80, ny: 80 }, 4, { lon: 12, lat: 0 });
  expect([field.width, field.height, field.block]).toEqual([20, 20, 4]);
  expect(field.degrees[0]).toBeCloseTo(Math.hypot(2 - 0.075, 2 - 0.075), 2);
  expect(modelPicture(field, 40, 1, shell, 0.1).every((v) => v === 0)).toBe(true);
});
