/** A shell open for marking, and hands on its map: positions in image pixels of the small cube. */
import type { CDPSession, Page } from 'playwright-core';
import { newShell } from '../api/fixture';
import { until, type SignedIn } from '../api/harness';
import { PHONE, WIDE, type Screen, type Stage } from './browser';

export const [NX, NY] = [64, 60];

export interface Marked {
  marks: {
    id: string;
    channel: number;
    x: number;
    y: number;
    sigma?: number;
    unsure?: true;
    note?: string;
    placed?: string;
  }[];
  revision: number;
}

export const readingOf = async (who: SignedIn, shellId: string): Promise<Marked> =>
  (await who.get(`/shells/${shellId}/readings/mine`)).body as Marked;

export async function openShell(
  stage: Stage,
  who: SignedIn,
  { regionId, cubeId }: { regionId: string; cubeId: string },
  { login = 'lena', screen = WIDE, channel = 16, shell }: Partial<OpenWith> = {},
) {
  const shellId = shell ?? (await newShell(who, regionId));
  const { page, context, errors } = await stage.open(screen, login);
  await page.goto(`/cubes/${cubeId}?shell=${shellId}&ch=${channel}`);
  await page.getByRole('button', { name: 'Mark', exact: true }).waitFor();
  await page.getByTestId('map').waitFor();
  await painted(page);
  return { page, context, errors, shellId };
}
interface OpenWith {
  login: string;
  screen: Screen;
  channel: number;
  shell: string;
}
export { PHONE, WIDE };

/** Until a channel has been drawn in full. */
export const painted = (page: Page) =>
  until(
    () =>
      page.evaluate(
        `performance.getEntriesByName('outswell:channel-painted').some((e) => e.detail.block === 1)`,
      ),
    (done) => done === true,
  );

export interface Spot {
  x: number;
  y: number;
}

/** Where an image pixel is on the page, when the whole image is shown. */
export async function onPage(page: Page, { x, y }: Spot): Promise<Spot> {
  const box = (await page.getByTestId('map').boundingBox())!;
  const scale = Math.min(box.width / NX, box.height / NY);
  return {
    x: box.x + box.width / 2 + (x - (NX - 1) / 2) * scale,
    y: box.y + box.height / 2 - (y - (NY - 1) / 2) * scale,
  };
}

export async function click(page: Page, at: Spot, modifiers: 'Shift'[] = []) {
  const { x, y } = await onPage(page, at);
  for (const key of modifiers) await page.keyboard.down(key);
  await page.mouse.click(x, y);
  for (const key of modifiers) await page.keyboard.up(key);
}

/** Press at the first place, and go through the others. */
export async function drag(page: Page, ...places: Spot[]) {
  const [from, ...rest] = await Promise.all(places.map((at) => onPage(page, at)));
  await page.mouse.move(from!.x, from!.y);
  await page.mouse.down();
  for (const to of rest) await page.mouse.move(to.x, to.y, { steps: 6 });
  await page.mouse.up();
}

export const tap = async (page: Page, at: Spot) => {
  const { x, y } = await onPage(page, at);
  await page.touchscreen.tap(x, y);
};

/** A finger on the map, as the browser itself reports fingers. */
export async function finger(page: Page) {
  const client: CDPSession = await page.context().newCDPSession(page);
  const send = (type: 'touchStart' | 'touchMove' | 'touchEnd', points: Spot[]) =>
    client.send('Input.dispatchTouchEvent', { type, touchPoints: points });
  return {
    down: async (at: Spot) => send('touchStart', [await onPage(page, at)]),
    async to(at: Spot, from?: Spot) {
      const [a, b] = [from && (await onPage(page, from)), await onPage(page, at)];
      for (let i = 1; i <= 6; i++)
        await send('touchMove', [a ? { x: a.x + ((b.x - a.x) * i) / 6, y: a.y + ((b.y - a.y) * i) / 6 } : b]);
    },
    up: () => send('touchEnd', []),
  };
}

/** Take a tool: its button where there is room, the menu of tools elsewhere. */
export async function take(page: Page, name: string) {
  const button = page.getByRole('button', { name, exact: true });
  if (await button.count()) return button.click();
  await page.getByRole('button', { name: 'Tools', exact: true }).click();
  await page.getByRole('menuitem', { name, exact: true }).click();
}

export async function goToChannel(page: Page, channel: number) {
  const slider = page.getByRole('slider', { name: 'Channel', exact: true });
  await slider.focus();
  const number = async () =>
    Number(/channel (\d+) of/.exec((await slider.getAttribute('aria-valuetext')) ?? '')![1]);
  for (let now = await number(); now !== channel + 1; now = await number())
    await page.keyboard.press(now < channel + 1 ? 'ArrowRight' : 'ArrowLeft');
}
