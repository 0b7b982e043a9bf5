import { niceTicks, type Ticks } from '@/shared/image/ticks';

export interface DiagramRing {
  channel: number | null;
  /** km/s */
  velocity: number;
  /** Angular radius, degrees, and its standard error where it is known. */
  theta: number;
  se: number | null;
  marks: number;
}

/** The sphere's three numbers, degrees and km/s, with the band of one standard error where it is known. */
export interface DiagramModel {
  theta: number;
  vSys: number;
  vExp: number;
  /** Standard error of the ring radius at a velocity, degrees. */
  errorAt?: (velocity: number) => number;
  /** Ends of the 68 % band of the ring radius at a velocity, degrees; drawn in place of errorAt where it is given. */
  bandAt?: (velocity: number) => readonly [number, number];
}

/** The ends of both axes. Several diagrams with one domain compare. */
export interface DiagramDomain {
  velocity: readonly [number, number];
  /** Degrees, from 0. */
  radius: number;
  /** Data minus model, degrees, to both sides of 0. */
  residual: number;
}

export interface DiagramData {
  rings: readonly DiagramRing[];
  model: DiagramModel | null;
}

/** Axes that hold all rings with their errors, and the models up to twice the reach of the rings. */
export function domainOf(
  data: readonly DiagramData[],
  residualOf: (ring: DiagramRing, model: DiagramModel) => number | null,
): DiagramDomain {
  const rings = data.flatMap((d) => d.rings);
  const velocities = rings.map((r) => r.velocity);
  const radii = rings.map((r) => r.theta + Math.min(r.se ?? 0, r.theta));
  const reach = velocities.length > 0 ? [Math.min(...velocities), Math.max(...velocities)] : null;
  for (const { model } of data) {
    if (!model) continue;
    // A v_exp that the marks do not bound would squeeze everything else into a line.
    const most = reach ? Math.max(reach[1]! - reach[0]!, 1) * 1.5 : Infinity;
    velocities.push(model.vSys - Math.min(model.vExp, most), model.vSys + Math.min(model.vExp, most));
    radii.push(model.theta);
  }
  const low = velocities.length > 0 ? Math.min(...velocities) : -1;
  const high = velocities.length > 0 ? Math.max(...velocities) : 1;
  const room = Math.max((high - low) * 0.06, 0.5);
  const residuals = data.flatMap(({ rings: own, model }) =>
    model ? own.map((r) => Math.abs(residualOf(r, model) ?? 0) + (r.se ?? 0)) : [],
  );
  const radius = Math.max(...radii, 1e-6) * 1.12;
  return {
    velocity: [low - room, high + room],
    radius,
    residual: Math.max(...residuals, radius * 0.02) * 1.15,
  };
}

/** Position of the drawing inside its frame, px. */
export const MARGIN = { left: 44, right: 10, top: 18, bottom: 34, between: 14 };

export interface DiagramLayout {
  x: (velocity: number) => number;
  y: (radius: number) => number;
  yResidual: (degrees: number) => number;
  left: number;
  right: number;
  top: number;
  /** Lower edge of the upper panel, and both edges of the lower one. */
  floor: number;
  residualTop: number;
  residualFloor: number;
  velocityTicks: Ticks;
  radiusTicks: Ticks;
}

/** Lay the two panels out in a frame: radii above, residuals below in a quarter of the height. */
export function diagramLayout(
  domain: DiagramDomain,
  width: number,
  height: number,
  withResiduals: boolean,
): DiagramLayout {
  const left = MARGIN.left;
  const right = Math.max(width - MARGIN.right, left + 1);
  const top = MARGIN.top;
  const bottom = height - MARGIN.bottom;
  const below = withResiduals ? Math.max((bottom - top) * 0.24, 36) : 0;
  const floor = withResiduals ? bottom - below - MARGIN.between : bottom;
  const [v0, v1] = domain.velocity;
  const middle = bottom - below / 2;
  return {
    x: (v) => left + ((v - v0) / (v1 - v0)) * (right - left),
    y: (r) => floor - (r / domain.radius) * (floor - top),
    yResidual: (d) => middle - (d / domain.residual) * (below / 2),
    left,
    right,
    top,
    floor,
    residualTop: bottom - below,
    residualFloor: bottom,
    velocityTicks: niceTicks(v0, v1, (right - left) / 70),
    radiusTicks: niceTicks(0, domain.radius, (floor - top) / 44),
  };
}

/** Velocities along the model's curve, close together near the caps where it is steep. */
export function curveVelocities({ vSys, vExp }: DiagramModel, points = 97): number[] {
  return Array.from({ length: points }, (_, i) => vSys - vExp * Math.cos((Math.PI * i) / (points - 1)));
}
