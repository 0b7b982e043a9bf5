import type { Random } from '@/shared/random';
import type { FitInput, SkyMark } from '@/shared/shell/fitInput';
import { DEGREE, eastNorth, lonLatOf, unitVector } from '@/shared/sky/greatCircle';

/** A way of marking a shell, with errors of known size. Degrees, km/s. */
export interface Design {
  l: number;
  b: number;
  theta: number;
  vSys: number;
  vExp: number;
  channelWidth: number;
  /** Velocities of the channels, as (v - vSys)/vExp; rounded to the grid of channels. */
  u: number[];
  marksPerChannel: number;
  /** Error of a mark along the radius and across it. */
  sigma: number;
  /** Position angles over which the marks are spread. */
  arc: [number, number];
  /** spread: every mark at its own velocity in the channel; mean: all on the ring averaged over it. */
  within: 'spread' | 'mean';
  /** A radius offset and a centre shift that the marks of a channel share, in units of sigma. */
  ringBias: number;
  ringShift: number;
  /** Share of the marks that lie off the rim, by 4 to 12 sigma. */
  outliers: number;
  /** What is said of v_sys: a prior of this standard deviation about a draw of it; 0: held at the truth. */
  vSysSd: number | null;
}

const evenly = (from: number, to: number, n: number) =>
  Array.from({ length: n }, (_, i) => from + ((to - from) * i) / (n - 1));
const rings = (channels: number, marksPerChannel: number, reach = 0.85) => ({
  u: evenly(-reach, reach, channels),
  marksPerChannel,
});
const NEAR_CAP = { u: evenly(-0.9, -0.1, 6) };

const ORDINARY: Design = {
  l: 120,
  b: -5,
  theta: 2,
  vSys: -40,
  vExp: 15,
  channelWidth: 1,
  ...rings(8, 10),
  sigma: 0.06,
  arc: [0, 360],
  within: 'spread',
  ringBias: 0,
  ringShift: 0,
  outliers: 0,
  vSysSd: null,
};

/** The simulated cases, under the names of tests/reference/shells/coverage.json. */
const CHANGES: Record<string, Partial<Design>> = {
  'full 8x10': {},
  'full 6x8': rings(6, 8),
  'full 12x16': rings(12, 16, 0.9),
  'few 4x6': rings(4, 6, 0.75),
  'arc 120': { arc: [30, 150] },
  'arc 120, sigma/theta 0.1': { arc: [30, 150], sigma: 0.2 },
  'cap (prior)': { ...NEAR_CAP, vSysSd: 1 },
  'cap (fixed)': { ...NEAR_CAP, vSysSd: 0 },
  'large 15 deg': { theta: 15, b: 20, sigma: 0.3, vExp: 20 },
  'small 5 beams': { theta: 0.125, sigma: 0.0125 },
  'outliers 1 in 10': { outliers: 0.1 },
  'ring bias 1, 8x10': { ringBias: 1 },
  'ring bias 1, 6x8': { ...rings(6, 8), ringBias: 1 },
  'ring bias 1, 12x16': { ...rings(12, 16, 0.9), ringBias: 1 },
  'ring bias 1, 4x6': { ...rings(4, 6, 0.75), ringBias: 1 },
  'bias 0.7 + shift 0.7': { ringBias: 0.7, ringShift: 0.7 },
  'ring bias + outliers': { ringBias: 1, outliers: 0.1 },
  'coarse channels, smooth rim': { ...rings(6, 10), channelWidth: 4, within: 'mean' },
};

export const DESIGNS = new Map<string, Design>(
  Object.entries(CHANGES).map(([name, change]) => [name, { ...ORDINARY, ...change }]),
);

/** Steps in which a smooth rim is averaged over a channel. */
const STEPS = 200;
const OUTLIER = { least: 4, most: 12 };

/** One reading of a design. */
export function simulate(design: Design, random: Random): FitInput {
  const { channelWidth, vSys, vExp, marksPerChannel, arc, ringBias, ringShift, vSysSd } = design;
  const sigma = design.sigma * DEGREE;
  const sine = Math.sin(design.theta * DEGREE);
  const n = unitVector({ lon: design.l, lat: design.b });
  const { east, north } = eastNorth(n);
  const steps = [...new Set(design.u.map((u) => halfToEven((u * vExp) / channelWidth)))].sort(
    (a, b) => a - b,
  );
  const outlying = chosen(random, steps.length * marksPerChannel, design.outliers);
  const marks: SkyMark[] = [];
  for (const step of steps) {
    const velocity = vSys + step * channelWidth;
    const bias = sigma * ringBias * random.normal();
    const [shiftE, shiftN] = [sigma * ringShift * random.normal(), sigma * ringShift * random.normal()];
    for (let i = 0; i < marksPerChannel; i++) {
      const psi = (arc[0] + ((arc[1] - arc[0]) * (i + random.uniform())) / marksPerChannel) * DEGREE;
      const [S, C] = [Math.sin(psi), Math.cos(psi)];
      const theta = Math.asin(sine * cosineWithin(design, velocity, random));
      const away = outlying.has(marks.length)
        ? sigma *
          (random.uniform() < 0.5 ? -1 : 1) *
          (OUTLIER.least + (OUTLIER.most - OUTLIER.least) * random.uniform())
        : 0;
      const dr = sigma * random.normal() + away + bias + S * shiftE + C * shiftN;
      const dt = sigma * random.normal() + C * shiftE - S * shiftN;
      const [c, s] = [Math.cos(theta), Math.sin(theta)];
      const place = [0, 1, 2].map((a) => {
        const outward = S * east[a]! + C * north[a]!;
        const along = C * east[a]! - S * north[a]!;
        return c * n[a]! + s * outward + dr * (c * outward - s * n[a]!) + dt * along;
      });
      const { lon, lat } = lonLatOf(place as unknown as [number, number, number]);
      marks.push({ l: lon, b: lat, velocity, sigma: design.sigma });
    }
  }
  const vSysGiven =
    vSysSd === null ? {} : { vSys: { value: vSys + vSysSd * random.normal(), sigma: vSysSd } };
  return { marks, channelWidth, ...vSysGiven };
}

/** cos psi of a mark: at a velocity of its own within the channel and the shell, or averaged over both. */
function cosineWithin(
  { within, channelWidth, vSys, vExp }: Design,
  velocity: number,
  random: Random,
): number {
  const at = (share: number) => (velocity + channelWidth * share - vSys) / vExp;
  if (within === 'spread') {
    let u: number;
    do u = at(random.uniform() - 0.5);
    while (Math.abs(u) >= 1);
    return Math.sqrt(1 - u * u);
  }
  let [sum, inside] = [0, 0];
  for (let i = 0; i < STEPS; i++) {
    const u = at((i + 0.5) / STEPS - 0.5);
    if (Math.abs(u) >= 1) continue;
    sum += Math.sqrt(1 - u * u);
    inside++;
  }
  return sum / inside;
}

/** A share of the numbers below `count`, at random. */
function chosen(random: Random, count: number, share: number): Set<number> {
  const picked = new Set<number>();
  const wanted = Math.round(share * count);
  while (picked.size < wanted) picked.add(Math.floor(random.uniform() * count));
  return picked;
}

/** Nearest whole number; the even one of two, as numpy rounds. */
function halfToEven(x: number): number {
  const below = Math.floor(x);
  const rest = x - below;
  return rest === 0.5 ? (below % 2 === 0 ? below : below + 1) : Math.round(x);
}
