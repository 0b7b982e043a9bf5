import type { Shell } from '@/shared/contract/shells';
import { kinematicAge } from '@/shared/physics/age';

export interface ChartPoint {
  shell: Shell;
  /** pc */
  radius: number;
  radiusError: number;
  /** km/s */
  vExp: number;
  /** Below and above; a side without a bound has none drawn. */
  vExpError: [number, number];
}

/** Shells that have both axes: an adopted fit and a distance. */
export const pointsOf = (shells: readonly Shell[]): ChartPoint[] =>
  shells.flatMap((shell) => {
    const m = shell.adopted;
    if (!m?.radius || !(m.radius.value > 0) || !(m.vExp.value > 0)) return [];
    const v = m.vExp;
    return [
      {
        shell,
        radius: m.radius.value,
        radiusError: m.radius.se ?? 0,
        vExp: v.value,
        vExpError: [
          v.lo === null ? (v.se ?? 0) : v.value - v.lo,
          v.hi === null ? (v.se ?? 0) : v.hi - v.value,
        ] as [number, number],
      },
    ];
  });

export interface ChartDomain {
  x: [number, number];
  y: [number, number];
}

/** Logarithmic axes that hold every point with its error and some room; at least a factor of three on each. */
export function chartDomain(points: readonly ChartPoint[]): ChartDomain {
  const range = (low: number[], high: number[], fallback: [number, number]): [number, number] => {
    const least = Math.min(...low.filter((x) => x > 0));
    const most = Math.max(...high);
    if (!Number.isFinite(least) || !Number.isFinite(most)) return fallback;
    const middle = Math.sqrt(least * most);
    const half = Math.max(Math.sqrt(most / least) * 1.25, Math.sqrt(3));
    return [middle / half, middle * half];
  };
  const floor = (value: number, error: number) => (error < value ? value - error : value / 2);
  return {
    x: range(
      points.map((p) => floor(p.radius, p.radiusError)),
      points.map((p) => p.radius + p.radiusError),
      [10, 1000],
    ),
    y: range(
      points.map((p) => floor(p.vExp, p.vExpError[0])),
      points.map((p) => p.vExp + p.vExpError[1]),
      [3, 50],
    ),
  };
}

/** Round values of a logarithmic axis: 1, 2, 5 times powers of ten; 1, 1.5, 2, 3, 5, 7 where those are too few. */
export function logTicks([low, high]: readonly [number, number]): number[] {
  const within = (steps: readonly number[]) => {
    const ticks: number[] = [];
    for (let e = Math.floor(Math.log10(low)); e <= Math.ceil(Math.log10(high)); e++)
      for (const step of steps) {
        const tick = Number((step * 10 ** e).toPrecision(3));
        if (tick >= low && tick <= high) ticks.push(tick);
      }
    return ticks;
  };
  const coarse = within([1, 2, 5]);
  return coarse.length >= 3 ? coarse : within([1, 1.5, 2, 3, 4, 5, 7]);
}

export interface AgeLine {
  /** Myr */
  age: number;
  points: { x: number; y: number }[];
}

/** Round ages, fewest first: the first series that puts at least two lines on the chart is taken. */
const SERIES = [
  [0.1, 1, 10, 100],
  [0.1, 0.3, 1, 3, 10, 30, 100],
  [0.1, 0.2, 0.3, 0.5, 0.7, 1, 1.5, 2, 3, 4, 5, 7, 10, 15, 20, 30, 50, 70, 100],
];

/**
 * Lines of constant age = factor · R / v_exp, cut to the axes: straight, of slope one, on logarithmic axes. The middle
 * point is where the label goes.
 */
export function ageLines(domain: ChartDomain, factor: number): AgeLine[] {
  const [few, more, many] = SERIES.map((ages) => ages.flatMap((age) => ageLine(domain, factor, age)));
  return few!.length >= 3 ? few! : more!.length >= 2 ? more! : many!;
}

function ageLine(domain: ChartDomain, factor: number, age: number): AgeLine[] {
  // Myr of 1 pc at 1 km/s: the unit conversion lives in one place
  const perUnit = kinematicAge({ value: 1, se: 0 }, { value: 1, se: 0 }, { factor })!.value;
  const radiusAt = (v: number) => (v * age) / perUnit;
  const x0 = Math.max(domain.x[0], radiusAt(domain.y[0]));
  const x1 = Math.min(domain.x[1], radiusAt(domain.y[1]));
  if (!(x1 > x0 * 1.3)) return [];
  const label = x0 * (x1 / x0) ** 0.8;
  return [{ age, points: [x0, label, x1].map((x) => ({ x, y: (perUnit * x) / age })) }];
}
