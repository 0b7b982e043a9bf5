/** What is painted over the map, read back from its canvas. */
import type { Page } from 'playwright-core';
import { NX, NY } from './markingHands';

export interface Looking {
  zoom: number;
  x: number;
  y: number;
}
/** Where an image point is on the overlay, CSS pixels from its upper left corner. */
export async function placed(page: Page, { zoom, x: x0, y: y0 }: Looking) {
  const box = (await page.getByTestId('map').boundingBox())!;
  const scale = zoom * Math.min(box.width / NX, box.height / NY);
  return {
    scale,
    at: ({ x, y }: { x: number; y: number }) => ({
      sx: box.width / 2 + (x - x0) * scale,
      sy: box.height / 2 - (y - y0) * scale,
    }),
  };
}

/**
 * Centre of what is painted in a colour about a place, CSS pixels from it, and its weight: of a disc both ways, of a line
 * across. Weight is how much of the colour's warm or cold part a pixel has, so that dark edges and white lines count for
 * nothing; for what is light, how light it is.
 */
export const centreOf = (
  page: Page,
  { sx, sy }: { sx: number; sy: number },
  colour: 'warm' | 'cold' | 'light',
  reach: number,
): Promise<[number, number, number]> =>
  page.evaluate(`(() => {
    const canvas = document.querySelector('[data-testid=overlay]');
    const ratio = canvas.width / canvas.clientWidth;
    const [cx, cy, r] = [${sx} * ratio, ${sy} * ratio, ${reach} * ratio];
    const [left, top] = [Math.floor(cx - r), Math.floor(cy - r)];
    const side = Math.ceil(2 * r) + 1;
    const { data } = canvas.getContext('2d').getImageData(left, top, side, side);
    const parts = {
      warm: (red, green, blue) => red - blue,
      cold: (red, green, blue) => blue - red,
      light: (red, green, blue) => Math.min(red, green, blue) - 100,
    };
    let [w, x, y] = [0, 0, 0];
    for (let j = 0; j < side; j++)
      for (let i = 0; i < side; i++) {
        const at = 4 * (j * side + i);
        const [dx, dy] = [left + i + 0.5 - cx, top + j + 0.5 - cy];
        if (Math.hypot(dx, dy) > r) continue;
        const part = parts['${colour}'](data[at], data[at + 1], data[at + 2]);
        const weight = (Math.max(part, 0) * data[at + 3]) / 255;
        w += weight; x += weight * dx; y += weight * dy;
      }
    return [x / w / ratio, y / w / ratio, w];
  })()`) as Promise<[number, number, number]>;
