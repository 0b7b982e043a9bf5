/** Maps, cuts and spectra against numbers worked out here from the same formula that fills the file. */
import { cubeFile, PIXEL } from './cubeFile';
import { newRegion } from './fixture';
import { binaryBody, startProduct, until, type Product, type SignedIn } from './harness';
import { upload } from './uploading';

let product: Product;
let lead: SignedIn;
let regionId: string;
beforeAll(async () => {
  product = await startProduct();
  await product.startWorker();
  lead = await product.signIn('lena');
  regionId = await newRegion(lead);
});
afterAll(() => product.stop());

/** Larger than a mebibyte, so that spectra have a copy of their own; no side a multiple of a tile. */
const shape = { nx: 61, ny: 53, channels: 100 };
const noise = (x: number, y: number, k: number) => {
  const s = Math.sin(x * 12.9898 + y * 78.233 + k * 37.719) * 43758.5453;
  return s - Math.floor(s) - 0.5;
};
const sky = (x: number, y: number, k: number): number => {
  if (x + y < 6) return NaN;
  const off = (k - 40 - x / 10) / 4;
  return Math.fround(noise(x, y, k) + 20 * Math.exp(-0.5 * off * off) * (1 + y / 50));
};
const velocityOf = (k: number) => -56 + k;

/** The same sky with its axes in another order, fastest first. */
function cubeInOrder(order: ('x' | 'y' | 'k')[], name: string): Buffer {
  const length = { x: shape.nx, y: shape.ny, k: shape.channels };
  const cards = {
    x: { CTYPE: 'GLON-CAR', CRVAL: 120, CRPIX: 31, CDELT: -PIXEL, CUNIT: 'deg' },
    y: { CTYPE: 'GLAT-CAR', CRVAL: 0, CRPIX: 27, CDELT: PIXEL, CUNIT: 'deg' },
    k: { CTYPE: 'VRAD', CRVAL: -56000, CRPIX: 1, CDELT: 1000, CUNIT: 'm/s' },
  };
  const numbered = order.flatMap((axis, i) =>
    Object.entries(cards[axis]).map(([card, value]) => [`${card}${i + 1}`, value] as const),
  );
  const [a, b, c] = order;
  return cubeFile({
    nx: length[a!],
    ny: length[b!],
    channels: length[c!],
    cards: { ...Object.fromEntries(numbered), OBJECT: name },
    value(i, j, l) {
      const at = { [a!]: i, [b!]: j, [c!]: l } as Record<'x' | 'y' | 'k', number>;
      return sky(at.x, at.y, at.k);
    },
  });
}

async function ingested(bytes: Buffer): Promise<string> {
  const { cubeId, problem } = await upload(lead, product.url, regionId, bytes);
  expect(problem).toBeNull();
  const cube = await until(
    async () => (await lead.get(`/cubes/${cubeId}`)).body,
    (c) => ['ready', 'failed'].includes(c.status),
  );
  expect(cube.problem).toBeNull();
  return cubeId!;
}

async function plane(path: string) {
  const { headers, body } = await lead.get(path).buffer(true).parse(binaryBody).expect(200);
  const bytes = Uint8Array.from(body as Buffer);
  const [width, height] = [Number(headers['plane-width']), Number(headers['plane-height'])];
  const numbers = bytes.length === width * height ? bytes : new Uint16Array(bytes.buffer);
  expect(numbers).toHaveLength(width * height);
  const [scale, offset, blank] = ['scale', 'offset', 'blank'].map((n) => Number(headers[`plane-${n}`])) as [
    number,
    number,
    number,
  ];
  const at = (x: number, y: number) => {
    const n = numbers[y * width + x]!;
    return n === blank ? NaN : offset + scale * n;
  };
  return { headers, width, height, scale, at };
}

const ORDERS: ('x' | 'y' | 'k')[][] = [
  ['x', 'y', 'k'],
  ['y', 'x', 'k'],
  ['k', 'x', 'y'],
  ['k', 'y', 'x'],
  ['x', 'k', 'y'],
  ['y', 'k', 'x'],
];

describe.each(ORDERS.map((order) => ({ order, name: order.join('') })))('axes $name', ({ order, name }) => {
  let id: string;
  beforeAll(async () => {
    id = await ingested(cubeInOrder(order, name));
  });

  test('a channel is that of the file, in 16 and in 8 bits, and so are its numbers', async () => {
    for (const bits of [16, 8]) {
      const p = await plane(`/cubes/${id}/channels/42/plane?bits=${bits}`);
      expect([p.width, p.height]).toEqual([shape.nx, shape.ny]);
      for (let y = 0; y < shape.ny; y++)
        for (let x = 0; x < shape.nx; x++)
          if (x + y < 6) expect(p.at(x, y)).toBeNaN();
          else expect(Math.abs(p.at(x, y) - sky(x, y, 42))).toBeLessThanOrEqual(p.scale * 0.5001 + 1e-6);
    }
    const { items } = (await lead.get(`/cubes/${id}/channels`)).body;
    const values = everyPixel((x, y) => sky(x, y, 42)).filter((v) => !Number.isNaN(v));
    const ordered = Float64Array.from(values).sort();
    const half = ordered.length >> 1;
    const median = ordered.length % 2 ? ordered[half]! : (ordered[half - 1]! + ordered[half]!) / 2;
    expect(items[42].median).toBeCloseTo(median, 12);
    expect(items[42].maximum).toBe(ordered.at(-1));
    expect(items[42].mean).toBeCloseTo(values.reduce((s, v) => s + v, 0) / values.length, 10);
  });

  test('the spectrum of a pixel, a disc and a ring', async () => {
    const one = (await lead.get(`/cubes/${id}/spectrum?x=60&y=52`)).body;
    one.brightness.forEach((b: number, k: number) => expect(b).toBe(sky(60, 52, k)));
    for (const [inner, radius] of [
      [0, 4],
      [2.5, 5],
    ] as const) {
      const found = (await lead.get(`/cubes/${id}/spectrum?x=9.2&y=10.4&inner=${inner}&radius=${radius}`))
        .body;
      for (const k of [0, 31, 32, 99]) {
        const values = everyPixel((x, y) => {
          const d = Math.hypot(x - 9.2, y - 10.4);
          return d <= radius && d >= inner ? sky(x, y, k) : NaN;
        }).filter((v) => !Number.isNaN(v));
        expect(found.brightness[k]).toBeCloseTo(values.reduce((s, v) => s + v, 0) / values.length, 9);
      }
    }
  });

  test('a cut is what bilinear interpolation between pixels gives', async () => {
    const c = await plane(`/cubes/${id}/cut?l=121&b=-0.9&toL=119.2&toB=0.7`);
    expect(c.height).toBe(shape.channels);
    expect(c.headers['cut-interpolation']).toMatch(/bilinear/);
    // near the equator of a plate carrée, pixels are degrees to a few parts in ten thousand
    const length = Math.hypot(1.8, 1.6);
    expect(Number(c.headers['cut-step']) * (c.width - 1)).toBeCloseTo(length, 3);
    expect(Number(c.headers['cut-step'])).toBeLessThanOrEqual(PIXEL);
    let compared = 0;
    for (let i = 0; i < c.width; i++) {
      const share = i / (c.width - 1);
      const [x, y] = [30 - (1 - 1.8 * share) / PIXEL, 26 + (-0.9 + 1.6 * share) / PIXEL];
      for (const k of [3, 33, 60]) {
        const expected = bilinear(x, y, k);
        if (Number.isNaN(expected)) continue;
        compared++;
        expect(Math.abs(c.at(i, k) - expected)).toBeLessThan(0.03);
      }
    }
    expect(compared).toBeGreaterThan(100);
  });
});

const everyPixel = (f: (x: number, y: number) => number) =>
  Array.from({ length: shape.nx * shape.ny }, (_, i) => f(i % shape.nx, Math.floor(i / shape.nx)));

function bilinear(x: number, y: number, k: number): number {
  const [i, j] = [Math.floor(x), Math.floor(y)];
  const [u, v] = [x - i, y - j];
  if (i < 0 || j < 0 || i + 1 >= shape.nx || j + 1 >= shape.ny) return NaN;
  return (
    (1 - u) * (1 - v) * sky(i, j, k) +
    u * (1 - v) * sky(i + 1, j, k) +
    (1 - u) * v * sky(i, j + 1, k) +
    u * v * sky(i + 1, j + 1, k)
  );
}

describe('one cube', () => {
  let id: string;
  beforeAll(async () => {
    id = await ingested(cubeInOrder(['x', 'y', 'k'], 'one cube'));
  });

  test('maps are the moments above the mask that is stated, total and peak of everything', async () => {
    const cube = (await lead.get(`/cubes/${id}`)).body;
    const maps = {
      total: await plane(`/cubes/${id}/maps/total`),
      velocity: await plane(`/cubes/${id}/maps/velocity`),
      dispersion: await plane(`/cubes/${id}/maps/dispersion`),
      peak: await plane(`/cubes/${id}/maps/peak`),
    };
    expect(maps.total.headers['plane-mask']).toMatch(/^none/);
    const threshold = Number(/at least ([\d.e-]+) K/.exec(maps.velocity.headers['plane-mask']!)![1]);
    // within some per cent: the stated noise comes from a sample of 64 of the 100 channels
    expect(Math.abs(threshold / (3 * cube.statistics.rms) - 1)).toBeLessThan(0.05);
    // uniform noise of unit width: its median absolute deviation is a quarter
    expect(Math.abs(cube.statistics.rms / (1.4826 * 0.25) - 1)).toBeLessThan(0.05);
    for (const [x, y] of [
      [0, 0],
      [30, 20],
      [60, 52],
      [6, 0],
    ] as const) {
      const spectrum = Array.from({ length: shape.channels }, (_, k) => sky(x, y, k));
      const bright = spectrum.map((v) => (v >= threshold ? v : 0));
      const weight = bright.reduce((s, v) => s + v, 0);
      const mean = bright.reduce((s, v, k) => s + v * velocityOf(k), 0) / weight;
      const square = bright.reduce((s, v, k) => s + v * (velocityOf(k) - mean) ** 2, 0) / weight;
      const expected = {
        total: spectrum.reduce((s, v) => s + v, 0),
        velocity: mean,
        dispersion: Math.sqrt(square),
        peak: Math.max(...spectrum),
      };
      for (const [kind, value] of Object.entries(expected)) {
        const map = maps[kind as keyof typeof maps];
        if (Number.isNaN(value)) expect(map.at(x, y)).toBeNaN();
        else expect(Math.abs(map.at(x, y) - value)).toBeLessThan(0.51 * map.scale + 1e-4);
      }
    }
    await lead.get(`/cubes/${id}/maps/radius`).expect(404);
  });

  test('a ring begins north and runs through east; what lies outside is blank', async () => {
    const c = await plane(`/cubes/${id}/cut?l=120&b=0&radius=1`);
    const quarter = c.width / 4;
    // north is up, east (larger longitude) to the left
    expect(Math.abs(c.at(0, 50) - bilinear(30, 46, 50))).toBeLessThan(0.3);
    if (Number.isInteger(quarter))
      expect(Math.abs(c.at(quarter, 50) - bilinear(10, 26, 50))).toBeLessThan(0.3);
    const wide = await plane(`/cubes/${id}/cut?l=120&b=0&radius=1.4`);
    expect(wide.at(0, 50)).toBeNaN();
  });

  test.each([
    ['cut?l=120&b=0', 'toL'],
    ['cut?l=120&b=0&toL=121&toB=0&radius=1', 'radius'],
    ['cut?l=120&b=0&toL=121', 'toB'],
    ['cut?l=120&b=0&toL=120&toB=0', 'toL'],
    ['cut?l=120&b=97&radius=1', 'b'],
    ['cut?l=20&b=40&toL=22&toB=40', 'l'],
    ['cut?b=0&radius=1', 'l'],
    ['spectrum?x=3', 'y'],
    ['spectrum?x=300&y=3', 'x'],
    ['spectrum?x=3&y=3&inner=5&radius=2', 'inner'],
    ['spectrum?x=3&y=3&of=median', 'of'],
    ['spectrum?of=mode', 'of'],
    ['channels/3/plane?bits=12', 'bits'],
  ])('%s is refused, and the field named', async (path, field) => {
    const { body } = await lead.get(`/cubes/${id}/${path}`).expect(422);
    expect(body).toMatchObject({ type: '/problems/invalid-input', field });
  });

  test('the whole cube has a mean, a median and a maximum spectrum', async () => {
    const { items } = (await lead.get(`/cubes/${id}/channels`)).body;
    for (const [of, column] of [
      ['mean', 'mean'],
      ['median', 'median'],
      ['maximum', 'maximum'],
    ] as const) {
      const { brightness } = (await lead.get(`/cubes/${id}/spectrum?of=${of}`)).body;
      expect(brightness).toEqual(items.map((c: Record<string, number>) => c[column]));
    }
  });

  test('the velocity map follows the velocity axis when that is corrected', async () => {
    const axis = { CTYPE3: 'FREQ', CRVAL3: 1420.6e6, CRPIX3: 1, CDELT3: -5000, CUNIT3: 'Hz', OBJECT: 'axis' };
    const line = (x: number, _y: number, k: number) => 10 * Math.exp(-0.5 * ((k - 8 - x / 4) / 2) ** 2);
    const other = await ingested(cubeFile({ nx: 8, ny: 8, channels: 20, cards: axis, value: line }));
    const velocities = async (): Promise<number[]> =>
      (await lead.get(`/cubes/${other}/channels`)).body.items.map((c: { velocity: number }) => c.velocity);
    const first = await velocities();
    const before = await plane(`/cubes/${other}/maps/velocity`);
    const total = await plane(`/cubes/${other}/maps/total`);
    await lead.patch(`/cubes/${other}/overrides`, { restFrequencyHz: 1420e6 }).expect(200);
    const second = await velocities();
    expect(Math.abs(second[0]! - first[0]!)).toBeGreaterThan(50);
    const after = await plane(`/cubes/${other}/maps/velocity`);
    // radio velocities are even along frequency: the place between channels stays
    const channel = (v: number, all: number[]) => (v - all[0]!) / (all[1]! - all[0]!);
    expect(channel(after.at(5, 3), second)).toBeCloseTo(channel(before.at(5, 3), first), 3);
    const wider = Math.abs((second[1]! - second[0]!) / (first[1]! - first[0]!));
    const totalAfter = await plane(`/cubes/${other}/maps/total`);
    expect(totalAfter.at(5, 3) / total.at(5, 3)).toBeCloseTo(wider, 9);
  });

  test('what a browser has already is not sent again, until something is said of the cube', async () => {
    const path = `/cubes/${id}/channels/3/plane`;
    const first = await lead.get(path).expect(200);
    expect(first.headers['cache-control']).toMatch(/private.*max-age=\d{6,}/);
    const tag = first.headers.etag!;
    for (const same of [path, `/cubes/${id}/maps/peak`, `/cubes/${id}/cut?l=120&b=0&radius=1`])
      await lead.get(same).set('If-None-Match', tag).expect(304);
    await lead.patch(`/cubes/${id}/overrides`, { unit: 'mK' }).expect(200);
    const again = await lead.get(path).set('If-None-Match', tag).expect(200);
    expect(again.headers.etag).not.toBe(tag);
  });
});
