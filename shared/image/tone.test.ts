import fc from 'fast-check';
import { rampOf } from '@/shared/image/palettes';
import { quantise } from '@/shared/image/quantise';
import { TONE_CURVES, TONES, buildLut, paint } from '@/shared/image/tone';

const unit = fc.double({ min: 0, max: 1, noNaN: true });

describe.each(TONES)('tone %s', (tone) => {
  const { forward, inverse } = TONE_CURVES[tone];
  test('runs from 0 to 1, rising, and comes back', () => {
    expect([forward(0), forward(1), inverse(0)]).toEqual([0, 1, 0]);
    expect(inverse(1)).toBeCloseTo(1, 14);
    fc.assert(
      fc.property(unit, unit, (t, u) => {
        expect(inverse(forward(t))).toBeCloseTo(t, 12);
        if (u > t + 1e-9) expect(forward(u)).toBeGreaterThan(forward(t));
      }),
    );
  });

  test('the table gives every number the colour its brightness has', () => {
    const q = quantise(Float32Array.from([-3, 40, 12, NaN]));
    const ramp = Uint32Array.from({ length: 64 }, (_, i) => i + 1);
    const window = [0, 25] as const;
    const lut = buildLut(q, { window, tone, ramp, blank: 999 });
    let wrong = 0;
    for (let n = 0; n < 65535; n++) {
      const t = Math.min(Math.max((q.offset + q.scale * n) / 25, 0), 1);
      const exact = forward(t) * 63;
      const near = lut[n] === Math.round(exact) + 1 || Math.abs(exact - Math.floor(exact) - 0.5) < 1e-6;
      if (!near) wrong++;
    }
    expect(wrong).toBe(0);
    expect(lut[65535]).toBe(999);
  });
});

test('a window without width is a step, a window outside the plane a flat colour', () => {
  const q = { scale: 1, offset: 0, blank: 65535 };
  const ramp = Uint32Array.from([1, 2, 3]);
  const step = buildLut(q, { window: [10, 10], tone: 'log', ramp, blank: 0 });
  expect([step[9], step[10]]).toEqual([1, 3]);
  expect(buildLut(q, { window: [-9, -5], tone: 'even', ramp, blank: 0 })[0]).toBe(3);
  expect(buildLut(q, { window: [1e6, 2e6], tone: 'even', ramp, blank: 0 })[65534]).toBe(1);
});

test('painting looks every number up', () => {
  const lut = new Uint32Array(65536).map((_, i) => i * 3);
  const out = new Uint32Array(3);
  paint(Uint16Array.from([0, 7, 65535]), lut, out);
  expect([...out]).toEqual([0, 21, 196605]);
  expect(() => paint(new Uint16Array(2), lut, out)).toThrow('2 numbers do not fill 3 pixels');
});

test('a megapixel takes milliseconds', () => {
  const plane = Uint16Array.from({ length: 1024 * 1024 }, (_, i) => (i * 7919) % 65536);
  const out = new Uint32Array(plane.length);
  const look = { window: [0, 65534] as const, tone: 'arcsinh' as const, ramp: rampOf('Ink'), blank: 0 };
  const times = Array.from({ length: 9 }, () => {
    const start = performance.now();
    paint(plane, buildLut({ scale: 1, offset: 0, blank: 65535 }, look), out);
    return performance.now() - start;
  });
  expect(Math.min(...times)).toBeLessThan(20);
});
