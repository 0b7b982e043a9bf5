/** Marks are placed, dragged and nudged in the polar and the stereographic view, and lie on the sky where the view says. */
import type { Page } from 'playwright-core';
import { polarView, stereographicView, type SkyView } from '@/shared/sky/polarView';
import { destination, separation } from '@/shared/sky/greatCircle';
import { buildWcs, type Wcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';
import { PIXEL } from '../api/cubeFile';
import { newRegion, newShell, readyCube } from '../api/fixture';
import { until, type SignedIn } from '../api/harness';
import { openStage, shot, WIDE, type Stage } from './browser';
import { painted, readingOf } from './markingHands';

jest.setTimeout(60_000);
let stage: Stage;
let lead: SignedIn;
let regionId: string;
let cubeId: string;
let spec: WcsSpec;
let wcs: Wcs;
beforeAll(async () => {
  stage = await openStage();
  lead = await stage.product.signIn('lena');
  regionId = await newRegion(lead);
  cubeId = await readyCube(stage.product, lead, regionId);
  spec = (await lead.get(`/cubes/${cubeId}`)).body.axes.wcs;
  wcs = buildWcs(spec);
});
afterAll(() => stage.close());

const CENTRE = { lon: 119.98, lat: 0.02 };
const REACH = 1.5;

/** Where a place on the sky is on the page, when the whole view is shown. */
async function onPage(
  page: Page,
  view: SkyView,
  [nx, ny]: [number, number],
  sky: { lon: number; lat: number },
) {
  const box = (await page.getByTestId('map').boundingBox())!;
  const scale = Math.min(box.width / nx, box.height / ny);
  const at = view.galacticToPixel(sky.lon, sky.lat)!;
  return {
    x: box.x + box.width / 2 + (at.x - (nx - 1) / 2) * scale,
    y: box.y + box.height / 2 - (at.y - (ny - 1) / 2) * scale,
  };
}

test.each([
  ['polar', [720, 300]],
  ['stereographic', [512, 512]],
] as const)('%s: a click, a drag and the arrows', async (lie, [nx, ny]) => {
  const shellId = await newShell(lead, regionId);
  const view =
    lie === 'polar'
      ? polarView({ centre: CENTRE, reach: REACH, nx, ny }, wcs)
      : stereographicView(CENTRE, REACH, nx, spec);
  const { page, context, errors } = await stage.open(WIDE, 'lena');
  await page.goto(
    `/cubes/${cubeId}?shell=${shellId}&ch=16&view=${lie}&about=${CENTRE.lon},${CENTRE.lat},${REACH}`,
  );
  await painted(page);
  await page.getByRole('button', { name: 'Mark', exact: true }).waitFor();
  const where = (sky: { lon: number; lat: number }) => onPage(page, view, [nx, ny], sky);
  const marks = async () =>
    (await readingOf(lead, shellId)).marks.map((m) => {
      const { l, b } = wcs.pixelToGalactic(m.x, m.y)!;
      return { lon: l, lat: b };
    });
  const lies = (sky: { lon: number; lat: number }, within: number) =>
    until(marks, (all) => all.length === 1 && separation(all[0]!, sky) < within);

  const first = destination(CENTRE, 130, 0.9);
  const from = await where(first);
  await page.mouse.click(from.x, from.y);
  await lies(first, 0.1 * PIXEL);

  const second = destination(CENTRE, 150, 0.7);
  const to = await where(second);
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  await page.mouse.move(to.x, to.y, { steps: 6 });
  await page.mouse.up();
  await lies(second, 0.1 * PIXEL);

  // a tenth of the beam of three pixels, the way that the arrow points on the picture
  await page.getByTestId('map').press('ArrowUp');
  const step = 0.3 * PIXEL;
  const expected =
    lie === 'polar' ? destination(CENTRE, 150, 0.7 - step) : { ...second, lat: second.lat + step };
  await lies(expected, 0.12 * PIXEL);
  await shot(page, WIDE, `marking-${lie}`);
  expect(errors).toEqual([]);
  await context.close();
});

test('a place that the image does not reach takes no mark', async () => {
  const shellId = await newShell(lead, regionId);
  const reach = 6;
  const { page, context } = await stage.open(WIDE, 'lena');
  await page.goto(
    `/cubes/${cubeId}?shell=${shellId}&ch=16&view=stereographic&about=${CENTRE.lon},${CENTRE.lat},${reach}`,
  );
  await painted(page);
  await page.getByRole('button', { name: 'Mark', exact: true }).waitFor();
  const view = stereographicView(CENTRE, reach, 512, spec);
  const out = await onPage(page, view, [512, 512], destination(CENTRE, 200, 3.5));
  await page.mouse.click(out.x, out.y);
  await page.getByText('The image does not reach there.').waitFor({ state: 'attached' });
  const inside = await onPage(page, view, [512, 512], destination(CENTRE, 200, 0.5));
  await page.mouse.click(inside.x, inside.y);
  const { marks } = await until(
    () => readingOf(lead, shellId),
    (r) => r.marks.length > 0,
  );
  expect(marks).toHaveLength(1);
  await context.close();
});
