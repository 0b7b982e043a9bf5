import { seededRandom } from '@/shared/random';
import { groupNoise, leastNoise, noiseGroups } from '@/shared/shell/trace/channelNoise';

const random = seededRandom(8);
const N = 20_000;
const structure = Float32Array.from({ length: N }, (_, i) => 10 + 8 * Math.sin(i / 37));
const channel = (level: number, sd: number) => structure.map((v) => v * level + sd * random.normal());

test('structure that changes steadily from channel to channel is not taken for noise', () => {
  const found = groupNoise(channel(0.9, 0.3), channel(1, 0.3), channel(1.1, 0.3))!;
  expect(Math.abs(found / 0.3 - 1)).toBeLessThan(0.02);
});

test('blank pixels and constant channels are left out', () => {
  const planes = [channel(1, 0.3), channel(1, 0.3), channel(1, 0.3)] as const;
  planes[0].fill(NaN, 0, N / 2);
  planes[1].fill(NaN, N / 4, N / 2);
  expect(groupNoise(...planes)! / 0.3).toBeCloseTo(1, 1);
  planes[2].fill(NaN, 20);
  expect(groupNoise(...planes)).toBeNull();
  const flat = new Float32Array(N).fill(4);
  expect(groupNoise(flat, flat, flat)).toBeNull();
});

test('the groups lie within the cube, and the quietest counts', () => {
  for (const channels of [3, 4, 7, 48, 1000]) {
    const groups = noiseGroups(channels);
    expect(groups.length).toBeGreaterThan(0);
    expect(new Set(groups).size).toBe(groups.length);
    for (const k of groups) expect(k >= 0 && k + 2 < channels).toBe(true);
  }
  expect(noiseGroups(2)).toEqual([]);
  expect(leastNoise([0.4, null, 0.3])).toBe(0.3);
  expect(leastNoise([null])).toBeNull();
});
