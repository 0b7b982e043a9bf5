import { colourBar } from '@/shared/image/figure/colourBar';
import { sectionOf } from '@/shared/image/figure/figureLayout';
import { crc32, pngWithDensity } from '@/shared/image/figure/pngDensity';
import { textWidth, wrapped } from '@/shared/image/figure/textWidth';
import { rampOf } from '@/shared/image/palettes';
import { buildLut, TONES } from '@/shared/image/tone';
import { fitted, panned, zoomedAbout } from '@/shared/image/viewport';

const bytes = (text: string) => Uint8Array.from(Buffer.from(text, 'latin1'));

test('the check of a chunk is that of the PNG specification', () => {
  expect(crc32(bytes('IEND'))).toBe(0xae426082); // the last four bytes of every PNG file
  expect(crc32(bytes('123456789'))).toBe(0xcbf43926); // the usual check value of this polynomial
});

test('a PNG file is told its size on paper, and stays what it was besides', () => {
  const onePixel = Buffer.from(
    'iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg==',
    'base64',
  );
  const out = Buffer.from(pngWithDensity(Uint8Array.from(onePixel), 600));
  const at = out.indexOf('pHYs');
  expect(at).toBe(33 + 4);
  expect(out.readUInt32BE(at + 4)).toBe(23622); // 600 / 0.0254
  expect(out[at + 12]).toBe(1);
  expect(Buffer.concat([out.subarray(0, 33), out.subarray(33 + 21)]).equals(onePixel)).toBe(true);
  expect(() => pngWithDensity(bytes('GIF89a'), 600)).toThrow(RangeError);
});

test.each(TONES)('numbers of the colour bar stand at the colours that the map paints: %s', (tone) => {
  const look = { window: [-1, 9] as const, tone, ramp: rampOf('Tide'), blank: 0 };
  const { ticks } = colourBar(look, 'K');
  expect(ticks.map((t) => t.label)).toEqual(['0', '2', '4', '6', '8']);
  const lut = buildLut({ scale: 1e-3, offset: -1, blank: 65535 }, look);
  for (const { at, label } of ticks) {
    const painted = lut[Math.round((Number(label) + 1) / 1e-3)]!;
    const colour = look.ramp.indexOf(painted) / (look.ramp.length - 1);
    expect(Math.abs(colour - at)).toBeLessThan(0.005);
  }
});

test('tiny brightness is told in powers of ten', () => {
  const look = { window: [0, 4e-5] as const, tone: 'even' as const, ramp: rampOf('Ink'), blank: 0 };
  const labels = colourBar(look, 'Jy/beam').ticks.map((t) => t.label);
  expect(labels).toEqual(expect.arrayContaining(['0', '1e−5', '2.5e−5', '4e−5']));
});

test('text is set in lines that fit, with its own breaks kept', () => {
  const lines = wrapped('Several words that must be set.\nAnd a second paragraph.', 100, 12);
  for (const line of lines) expect(textWidth(line, 12)).toBeLessThanOrEqual(100);
  expect(lines.join(' ')).toBe('Several words that must be set. And a second paragraph.');
  expect(lines).toContain('And a second');
  expect(wrapped('  ', 100, 12)).toEqual([]);
  expect(wrapped('one-word-longer-than-the-line', 40, 12)).toHaveLength(1);
});

test('the section of a map is what of the image it shows', () => {
  const whole = fitted(100, 80, 500, 500);
  expect(sectionOf(whole)).toEqual({ x0: -0.5, x1: 99.5, y0: -0.5, y1: 79.5 });
  const close = panned(zoomedAbout(whole, 4, { sx: 250, sy: 250 }), 5, 0);
  const part = sectionOf(close)!;
  expect(part.x1 - part.x0).toBeCloseTo(25, 9);
  expect(part.y1 - part.y0).toBeCloseTo(25, 9);
  expect((part.x0 + part.x1) / 2).toBeCloseTo(close.x, 9);
});
