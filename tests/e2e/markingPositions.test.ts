/** What is painted over the map lies where shared/sky puts it, at every zoom: the canvas is read back. */
import { marksOnRing, PIXEL } from '../api/cubeFile';
import { newRegion, newShell, readyCube, saveMarks } from '../api/fixture';
import { until, type SignedIn } from '../api/harness';
import { skyMarks } from '@/hooks/reading/skyMarks';
import { liveFit } from '@/shared/shell/fit';
import { modelRadius } from '@/shared/shell/channelCurve';
import { destination } from '@/shared/sky/greatCircle';
import { buildWcs, type Wcs } from '@/shared/sky/wcs';
import type { WcsSpec } from '@/shared/sky/wcsSpec';
import { openStage, WIDE, type Stage } from './browser';
import { centreOf, placed, type Looking } from './canvasBack';
import { painted } from './markingHands';

jest.setTimeout(120_000);
let stage: Stage;
let lead: SignedIn;
let regionId: string;
let cubeId: string;
let wcs: Wcs;
let channelWidth: number;
beforeAll(async () => {
  stage = await openStage();
  lead = await stage.product.signIn('lena');
  regionId = await newRegion(lead);
  cubeId = await readyCube(stage.product, lead, regionId);
  const { axes } = (await lead.get(`/cubes/${cubeId}`)).body;
  wcs = buildWcs(axes.wcs as WcsSpec);
  channelWidth = axes.spectral.channelWidth;
});
afterAll(() => stage.close());

/** About a point of a line this much of it is looked at, CSS pixels. */
const REACH = 6;

const LOOKS: Looking[] = [
  { zoom: 1, x: 31.5, y: 29.5 },
  { zoom: 2.5, x: 44, y: 42 },
  { zoom: 4, x: 45.2, y: 42.4 },
];
const params = ({ zoom, x, y }: Looking) => (zoom === 1 ? '' : `&zoom=${zoom}&x=${x}&y=${y}`);

test.each(LOOKS)(
  'a mark at zoom $zoom is painted within a tenth of a pixel of its place on the sky',
  async (look) => {
    const shellId = await newShell(lead, regionId);
    // two places on the sky, taken to pixels by the coordinates alone
    const sky = [
      { l: 119.613, b: 0.371 },
      { l: 119.321, b: 0.562 },
    ];
    const pixels = sky.map(({ l, b }) => wcs.galacticToPixel(l, b)!);
    await saveMarks(
      lead,
      shellId,
      cubeId,
      pixels.map((p, i) => ({ id: `m${i}`, channel: 16, ...p })),
    );
    const { page, context } = await stage.open(WIDE, 'lena');
    await page.goto(`/cubes/${cubeId}?shell=${shellId}&ch=16${params(look)}`);
    await painted(page);
    await page.getByLabel(/, 2 marks\./).waitFor();
    const { at } = await placed(page, look);
    for (const pixel of pixels) {
      const { sx, sy } = at(pixel);
      const [dx, dy] = await until(
        () => centreOf(page, { sx, sy }, 'warm', 8),
        ([, , weight]) => weight > 1000,
      );
      expect(Math.hypot(dx, dy)).toBeLessThan(0.1);
    }
    await context.close();
  },
);

test.each(LOOKS)(
  'the model ring at zoom $zoom follows the great circle to a tenth of a pixel',
  async (look) => {
    const shellId = await newShell(lead, regionId);
    const marks = [11, 14, 19, 22].flatMap((k) => marksOnRing(k).map((m, i) => ({ id: `m${k}-${i}`, ...m })));
    await saveMarks(lead, shellId, cubeId, marks);
    const fit = liveFit({ marks: skyMarks(marks, wcs), channelWidth });
    const value = (name: string) => fit.parameters[name]!.value;
    const shell = { theta: value('theta'), vSys: value('vSys'), vExp: value('vExp') };
    const radius = modelRadius(wcs.velocityOf(16), channelWidth, shell)!;

    const { page, context } = await stage.open(WIDE, 'lena');
    await page.goto(`/cubes/${cubeId}?shell=${shellId}&ch=16${params(look)}`);
    await painted(page);
    await page.getByTestId('handle-crown').waitFor();
    const { at, scale } = await placed(page, look);
    const canvas = (await page.getByTestId('map').boundingBox())!;
    const off: number[] = [];
    // between the places that the line was drawn through, where it is furthest from the circle
    for (let angle = 0.25; angle < 360; angle += 2.5) {
      const place = destination({ lon: value('l'), lat: value('b') }, angle, radius);
      const out = destination({ lon: value('l'), lat: value('b') }, angle, radius * 1.01);
      const [here, beyond] = [place, out].map(({ lon, lat }) => at(wcs.galacticToPixel(lon, lat)!));
      const { sx, sy } = here!;
      if (sx < 20 || sy < 60 || sx > canvas.width - 260 || sy > canvas.height - 90) continue; // under readout and bars
      const [dx, dy, weight] = await until(
        () => centreOf(page, { sx, sy }, 'cold', REACH),
        ([, , w]) => w > 500,
      );
      // across the line only: along it the window cuts it off
      const length = Math.hypot(beyond!.sx - sx, beyond!.sy - sy);
      const across = (dx * (beyond!.sx - sx) + dy * (beyond!.sy - sy)) / length;
      expect(weight).toBeGreaterThan(500);
      const bend = REACH ** 2 / (6 * (radius / PIXEL) * scale); // how far the arc in the window lies inside of its tangent
      off.push(Math.abs(across + bend));
    }
    // labels and arrows are drawn over the line and cut a few of the looked-at pieces off on one side
    off.sort((a, b) => a - b);
    expect(off.length).toBeGreaterThan(6);
    expect(off[Math.floor(0.8 * off.length)]).toBeLessThan(0.1);
    await context.close();
  },
);
