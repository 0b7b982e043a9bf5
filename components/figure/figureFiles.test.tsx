import { GifReader } from 'omggif';
import { captionWords, type CaptionFacts } from '@/components/figure/captionWords';
import { evenly, fileName, inARow, thereAndBack } from '@/components/figure/choices';
import { loopColours, loopFrame, loopWriter } from '@/components/figure/loopFile';

const [width, height] = [40, 30];
const picture = (colour: readonly [number, number, number]) => {
  const rgba = new Uint8ClampedArray(4 * width * height);
  for (let i = 0; i < width * height; i++) rgba.set([...colour, 255], 4 * i);
  return { rgba, width, height };
};

test('a loop decodes with all its pictures, their colours, its pace, and no end', () => {
  const pictures = [
    [250, 10, 20],
    [10, 240, 30],
    [20, 30, 230],
  ].map((c) => picture(c as [number, number, number]));
  const palette = loopColours(pictures);
  const writer = loopWriter(palette, 120);
  for (const p of thereAndBack(pictures)) writer.add(loopFrame(p, palette));
  const gif = new GifReader(Buffer.from(writer.bytes()));
  expect(gif.numFrames()).toBe(4);
  expect([gif.width, gif.height]).toEqual([width, height]);
  expect(gif.loopCount()).toBe(0); // for ever
  [0, 1, 2, 1].forEach((which, i) => {
    expect(gif.frameInfo(i).delay).toBe(12); // hundredths of a second
    const decoded = new Uint8Array(4 * width * height);
    gif.decodeAndBlitFrameRGBA(i, decoded);
    const truth = pictures[which]!.rgba;
    for (const k of [0, 1, 2]) expect(Math.abs(decoded[k]! - truth[k]!)).toBeLessThan(10);
  });
});

test('things evenly from the first to the last', () => {
  const list = [0, 1, 2, 3, 4, 5, 6, 7, 8, 9];
  expect(evenly(list, 4)).toEqual([0, 3, 6, 9]);
  expect(evenly(list, 20)).toEqual(list);
  expect(evenly(list, 1)).toEqual([5]);
  expect(evenly([], 3)).toEqual([]);
});

test.each([
  [1, 1, 1],
  [9, 1, 3],
  [4, 1, 2],
  [8, 2, 4],
  [20, 2, 5],
  [7, 2, 4],
] as const)('%i panels on %i columns: %i in a row', (panels, columns, expected) =>
  expect(inARow(panels, columns)).toBe(expected),
);

test('a file name holds letters, digits and dashes alone', () => {
  expect(fileName(['Quiet reach, field 2', '−42.3 km/s'], 'png')).toBe('Quiet-reach-field-2--42.3-km-s.png');
  expect(fileName(['a/../b'], 'svg')).not.toContain('/');
});

const facts: CaptionFacts = {
  cube: 'Quiet reach',
  region: 'Far meadow',
  channels: { first: 23, last: 23, count: 1, velocities: [-42.25, -42.25] },
  map: null,
  channelWidth: 1.03,
  velocityFrame: 'LSRK',
  palette: 'Ember',
  tone: 'root',
  window: '0–12 K',
  stated: [],
  shell: 'North arc',
  marks: 5,
  unsure: false,
  ownRing: true,
  traced: false,
  frozenBy: null,
  otherShells: false,
  model: { source: 'record', theta: 1.234, vSys: -41.2, vExp: 14.1 },
  beam: { major: 0.15, minor: 0.15 },
};

test('the caption says what is seen, in plain sentences', () => {
  expect(captionWords(facts)).toBe(
    'Quiet reach, Far meadow. Channel 24 at −42.3 km/s (LSRK), 1.03 km/s wide. Palette Ember, tone root, ' +
      'window 0–12 K. Dots: rim marks of North arc. Dashed: circle through the marks of the channel. ' +
      'Ring: fit of record, Θ = 1.23°, v_sys = −41.2 km/s, v_exp = 14.1 km/s. Beam 9.0′ × 9.0′, lower right.',
  );
});

test('a caption explains the signs of the layers that are drawn', () => {
  const words = captionWords({
    ...facts,
    traced: true,
    frozenBy: 'a fit of Wren, 2031-05-02',
    otherShells: true,
  });
  expect(words).toContain(
    'Lozenges: rim traced in the brightness; small crosses: looked for there, not found. ' +
      'Squares: marks of a fit of Wren, 2031-05-02. Dotted: rings of other adopted shells. Beam',
  );
});

test('a caption says what was done to the picture, and nothing of what is not there', () => {
  const bare = {
    ...facts,
    stated: ['mean of 3 channels'],
    marks: 0,
    ownRing: false,
    model: null,
    beam: null,
  };
  expect(captionWords(bare)).toBe(
    'Quiet reach, Far meadow. Channel 24 at −42.3 km/s (LSRK), 1.03 km/s wide. Mean of 3 channels. ' +
      'Palette Ember, tone root, window 0–12 K.',
  );
});
