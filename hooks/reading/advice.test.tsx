import { advice } from '@/hooks/reading/advice';
import { readingByChannel, skyMarks, type ChannelReading } from '@/hooks/reading/skyMarks';
import { destination } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';

const reading = (velocity: number, marks = 4): ChannelReading => ({
  channel: 0,
  velocity,
  marks,
  ring: null,
  reason: null,
});
const base = { marks: 0, fitted: false, problem: null, channelWidth: 1.03 };

describe('what would help most', () => {
  test('says how many marks and channels are missing', () => {
    expect(advice({ ...base, readings: [] })).toContain('tap points');
    expect(advice({ ...base, marks: 3, readings: [reading(1, 3)] })).toBe(
      '3 more marks on 2 more channels and the fit appears.',
    );
    expect(advice({ ...base, marks: 9, readings: [reading(1, 9)] })).toBe(
      '2 more marks on 2 more channels and the fit appears.',
    );
    expect(advice({ ...base, marks: 5, readings: [reading(1), reading(2), reading(3)] })).toBe(
      '1 more mark and the fit appears.',
    );
  });
  test('with a fit, asks for a third mark where two cannot disagree', () => {
    const readings = [reading(-50), reading(-40.2, 2), reading(-30)];
    expect(advice({ ...base, marks: 10, readings, fitted: true })).toBe(
      'A third mark on −40.2 km/s would show whether that ring agrees.',
    );
    const full = [-60, -36, -12].map((v) => reading(v));
    expect(advice({ ...base, marks: 12, readings: full, fitted: true })).toContain('Run the fit of record');
  });
  test('says why there is no fit', () => {
    const readings = [1, 2, 3].map((v) => reading(v));
    expect(advice({ ...base, marks: 12, readings, problem: 'All in a line.' })).toBe('All in a line.');
  });
});

test('the reading by channel finds rings by velocity and says why there is none', () => {
  const wcs = {
    pixelToGalactic: (x: number, y: number) => (x < 0 ? null : { l: x, b: y }),
    velocityOf: (k: number) => 10 - k,
  } as unknown as Wcs;
  const around = [10, 100, 200, 300].map((pa, i) => {
    const { lon, lat } = destination({ lon: 120, lat: 3 }, pa, 1.5);
    return { id: `r${i}`, channel: 2, x: lon, y: lat };
  });
  const marks = [...around, { id: 'a', channel: 5, x: 1, y: 1 }, { id: 'off', channel: 5, x: -1, y: 1 }];
  const found = readingByChannel(skyMarks(marks, wcs));
  expect(found.map((r) => [r.channel, r.velocity, r.marks, r.reason])).toEqual([
    [5, 5, 1, 'too-few'],
    [2, 8, 4, null],
  ]);
  expect(found[1]!.ring!.theta).toBeCloseTo(1.5, 6);
});
