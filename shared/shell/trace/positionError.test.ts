import { seededRandom } from '@/shared/random';
import { findRim } from '@/shared/shell/trace/findRim';
import { positionError } from '@/shared/shell/trace/positionError';
import { smoothed } from '@/shared/shell/trace/radialProfile';

const BEAM = 12; // samples
const SIGMA = BEAM / (2 * Math.sqrt(2 * Math.LN2));
const SAMPLES = 160;
const FLOOR = 0.35 * BEAM;

/** Noise of unit variance as seen through the beam. */
function beamNoise(random: { normal(): number }): Float64Array {
  const white = Float64Array.from({ length: SAMPLES + 80 }, () => random.normal());
  const seen = smoothed(white, SIGMA).subarray(40, 40 + SAMPLES);
  return seen.map((v) => v * Math.sqrt(2 * Math.sqrt(Math.PI) * SIGMA));
}

test.each(['ridge', 'inner'] as const)('noise moves the %s by what is said', (edge) => {
  const random = seededRandom(5);
  const noise = 0.03;
  const places: number[] = [];
  let stated = 0;
  for (let round = 0; round < 400; round++) {
    const n = beamNoise(random);
    const profile = n.map((v, i) => noise * v + Math.exp(-0.5 * ((i - SAMPLES / 2) / (1.5 * SIGMA)) ** 2));
    const rim = findRim(smoothed(profile, SIGMA / 2), { edge, noise, beam: BEAM });
    if (typeof rim === 'string') throw new Error(rim);
    places.push(rim.at);
    const error = positionError({ edge, noise, beam: BEAM, curvature: rim.curvature, most: SAMPLES });
    stated += (error ** 2 - FLOOR ** 2) / 400;
  }
  const mean = places.reduce((sum, x) => sum + x, 0) / places.length;
  const rms = Math.sqrt(places.reduce((sum, x) => sum + (x - mean) ** 2, 0) / places.length);
  expect(rms / Math.sqrt(stated)).toBeGreaterThan(0.85);
  expect(rms / Math.sqrt(stated)).toBeLessThan(1.15);
});

test('the error is between a third of a beam and half the window', () => {
  const of = (curvature: number, noise = 0.1) =>
    positionError({ edge: 'ridge', noise, beam: BEAM, curvature, most: 40 });
  expect(of(-1000)).toBeCloseTo(FLOOR, 3);
  expect(of(0)).toBe(40);
  expect(of(-0.002, 0)).toBe(FLOOR);
  expect(positionError({ edge: 'ridge', noise: 1, beam: BEAM, curvature: 0, most: 1 })).toBe(FLOOR);
});
