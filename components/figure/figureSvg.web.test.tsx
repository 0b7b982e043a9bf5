import type { Figure, FigureMark, Section } from '@/shared/image/figure/figure';
import { colourBar } from '@/shared/image/figure/colourBar';
import { wholeImage } from '@/shared/image/figure/figureLayout';
import { figureSvg } from '@/shared/image/figure/figureSvg';
import { graticule } from '@/shared/image/graticule';
import { rampOf } from '@/shared/image/palettes';
import { ringPath } from '@/shared/image/skyPath';
import { destination, separation } from '@/shared/sky/greatCircle';
import { buildWcs } from '@/shared/sky/wcs';

const [nx, ny] = [121, 91];
const wcs = buildWcs({
  version: 1,
  sky: {
    frame: 'galactic',
    equinox: null,
    projection: 'TAN',
    referencePixel: [60, 45],
    reference: [118.2, -3.1],
    matrix: [-0.05, 0, 0, 0.05],
    lonPole: null,
    latPole: null,
    parameters: [],
    size: [nx, ny],
  },
  spectral: {
    type: 'VRAD',
    linearIn: null,
    referenceChannel: 0,
    reference: -60_000,
    step: 1000,
    channels: 40,
    restFrequencyHz: null,
    restAssumed: true,
    convention: 'radio',
    frame: 'LSRK',
  },
});
const centre = { lon: 118.5, lat: -2.9 };
const project = ({ lon, lat }: { lon: number; lat: number }) => wcs.galacticToPixel(lon, lat);
const places = Array.from({ length: 12 }, (_, i) => destination(centre, 30 * i, 1.2));
const marks: FigureMark[] = places.map((p) => project(p)!);

function figure(more: Partial<Figure> & { raster?: Section } = {}): Figure {
  const section = more.section ?? wholeImage({ nx, ny });
  return {
    columns: 1,
    colours: {
      ground: '#fff',
      text: '#111',
      quiet: '#555',
      image: '#000',
      onImage: '#eee',
      person: '#fa0',
      model: '#0af',
    },
    font: { family: 'Some Face', css: '' },
    nx,
    ny,
    section,
    panels: [
      {
        raster: { href: 'data:image/png;base64,AAAA', ...(more.raster ?? section) },
        label: '−42.3 km/s',
        marks,
        modelRing: ringPath(centre, 1.2, project, nx),
        ownRing: null,
        centre: project(centre),
      },
    ],
    perRow: 1,
    graticule: (v) =>
      graticule(v, {
        project,
        unproject: (x, y) => {
          const at = wcs.pixelToGalactic(x, y);
          return at && { lon: at.l, lat: at.b };
        },
      }),
    axisNames: { lon: 'Galactic longitude', lat: 'Galactic latitude' },
    beam: [
      { x: 2, y: 0 },
      { x: 0, y: 2 },
      { x: -2, y: 0 },
    ],
    furniture: () => ({ bar: { px: 60, label: '1°' }, arrows: null }),
    bar: colourBar({ window: [-0.5, 12], tone: 'arcsinh', ramp: rampOf('Ember'), blank: 0 }, 'Brightness, K'),
    source: 'A cube & "more" <here>',
    caption: 'One sentence of a caption. '.repeat(8),
    ...more,
  };
}

function read(svg: string) {
  const page = new DOMParser().parseFromString(svg, 'image/svg+xml');
  const number = (of: Element, name: string) => Number(of.getAttribute(name));
  return { page, number, all: (selector: string) => Array.from(page.querySelectorAll(selector)) };
}

test.each<[string, Partial<Figure>]>([
  ['one column', {}],
  ['two columns', { columns: 2 }],
  ['without anything around', { graticule: null, bar: null, furniture: null, beam: null, caption: '' }],
])('%s: well-formed, of the width asked for, and needing nothing from outside', (_, more) => {
  const svg = figureSvg(figure(more));
  const { page, all } = read(svg);
  expect(all('parsererror')).toEqual([]);
  const root = page.documentElement;
  expect(root.getAttribute('width')).toBe(more.columns === 2 ? '180mm' : '88mm');
  const [, , width, height] = root.getAttribute('viewBox')!.split(' ').map(Number);
  expect(width).toBe(more.columns === 2 ? 900 : 440);
  expect(parseFloat(root.getAttribute('height')!)).toBeCloseTo(0.2 * height!, 1);
  expect(page.querySelector('title')?.textContent).toBe('A cube & "more" <here>');
  // the namespace is a name, not an address
  expect(svg.replace('http://www.w3.org/2000/svg', '')).not.toMatch(/https?:|@import/);
});

// the raster of a reduced plane reaches past the image's edge: blocks of four pixels
test.each<[string, Partial<Figure> & { raster?: Section }]>([
  ['the whole image', {}],
  ['a part of it', { section: { x0: 20.25, x1: 99.75, y0: 10.5, y1: 88.1 } }],
  ['a reduced plane', { columns: 2, raster: { x0: -0.5, x1: 123.5, y0: -0.5, y1: 91.5 } }],
])('marks lie where the sky has them on the raster: %s', (_, more) => {
  const given = figure(more);
  const { all, number } = read(figureSvg(given));
  const image = all('image')[0]!;
  const { x0, x1, y0, y1 } = given.panels[0]!.raster!;
  const toImage = (sx: number, sy: number) => ({
    x: x0 + ((sx - number(image, 'x')) / number(image, 'width')) * (x1 - x0),
    y: y1 - ((sy - number(image, 'y')) / number(image, 'height')) * (y1 - y0),
  });
  const drawn = all('circle.mark').map((c) => toImage(number(c, 'cx'), number(c, 'cy')));
  expect(drawn).toHaveLength(places.length);
  places.forEach((place, i) => {
    const truth = project(place)!;
    expect(Math.hypot(drawn[i]!.x - truth.x, drawn[i]!.y - truth.y)).toBeLessThan(0.01);
  });
  const ring = all('path.ring-model')[0]!.getAttribute('d')!;
  const corners = ring.split(/[ML]/).filter(Boolean);
  expect(corners.length).toBeGreaterThan(100);
  for (const corner of corners) {
    const [sx, sy] = corner.split(' ').map(Number);
    const at = toImage(sx!, sy!);
    const place = wcs.pixelToGalactic(at.x, at.y)!;
    expect(Math.abs(separation(centre, { lon: place.l, lat: place.b }) - 1.2) / 0.05).toBeLessThan(0.1);
  }
});

test('the layers of the map are in the figure, their signs about the places of marks', () => {
  const panel = figure().panels[0]!;
  const layers = {
    traced: marks.slice(0, 3),
    missed: [],
    shells: [{ name: 'East & wide', path: ringPath(centre, 0.8, project, nx), at: project(centre) }],
    frozen: marks.slice(3, 5),
  };
  const { all, number } = read(figureSvg(figure({ panels: [{ ...panel, layers }] })));
  const begun = (selector: string) =>
    Array.from(
      all(selector)[0]!
        .getAttribute('d')!
        .matchAll(/M([\d.]+) ([\d.]+)/g),
      ([, x, y]) => [Number(x), Number(y)],
    );
  const circles = all('circle.mark').map((c) => [number(c, 'cx'), number(c, 'cy')]);
  expect(begun('path.layer-traced')).toEqual(circles.slice(0, 3));
  expect(begun('path.layer-frozen')).toEqual(circles.slice(3, 5));
  expect(all('path.layer-missed')).toEqual([]);
  expect(all('path.ring-other')).toHaveLength(1);
  expect(all('text').map((t) => t.textContent)).toContain('East & wide');
});

test('axes, colour bar, beam, scale bar, source and caption are there, and inside the page', () => {
  const { page, all, number } = read(figureSvg(figure()));
  const texts = all('text').map((t) => t.textContent);
  for (const text of ['Galactic longitude', 'Galactic latitude', 'Brightness, K', '118°', '−42.3 km/s', '1°'])
    expect(texts).toContain(text);
  expect(all('.beam')).toHaveLength(1);
  expect(all('.scale-bar')).toHaveLength(1);
  expect(texts.filter((t) => t?.includes('caption')).length).toBeGreaterThan(2);
  const height = Number(page.documentElement.getAttribute('viewBox')!.split(' ')[3]);
  for (const t of all('svg > text')) expect(number(t, 'y')).toBeLessThan(height);
});

test('a sheet has a panel for each channel, and numbers only at its outer edges', () => {
  const panel = figure().panels[0]!;
  const panels = Array.from({ length: 5 }, (_, i) => ({ ...panel, label: `${i} km/s` }));
  const { all } = read(figureSvg(figure({ panels, perRow: 3, columns: 2 })));
  expect(all('image')).toHaveLength(5);
  const groups = all('svg > g').map((g) => Array.from(g.querySelectorAll('text')).map((t) => t.textContent));
  const withLat = groups.map((texts) => texts.some((t) => t?.startsWith('−') && t.endsWith('°')));
  expect(withLat).toEqual([true, false, false, true, false]);
  const withLon = groups.map((texts) => texts.some((t) => /^1\d\d/.test(t ?? '')));
  expect(withLon).toEqual([false, false, true, true, true]);
});

test('a figure without a panel or a section without width is refused', () => {
  expect(() => figureSvg(figure({ panels: [] }))).toThrow(RangeError);
  expect(() => figureSvg(figure({ section: { x0: 1, x1: 1, y0: 0, y1: 1 } }))).toThrow(RangeError);
});
