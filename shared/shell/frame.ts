import { eastNorth, type Vector } from '@/shared/sky/greatCircle';
import { curveTable, type CurveTable } from '@/shared/shell/channelCurve';
import { normalised, type MarkSet } from '@/shared/shell/markSet';
import { X, Y } from '@/shared/shell/shellModel';

/**
 * The plane tangent to the sphere of directions at `origin`, on which the shell's centre is moved, and the marks'
 * coordinates along its three axes. The plane sits on the shell itself, so nothing is singular at longitude 0 or at
 * a pole, and the offsets stay small.
 */
export interface Frame {
  origin: Vector;
  east: Vector;
  north: Vector;
  /** Components of each mark's unit vector along origin, east and north. */
  along: Float64Array;
  eastward: Float64Array;
  northward: Float64Array;
}

export function frameAt(marks: MarkSet, origin: Vector): Frame {
  const { count } = marks;
  const frame: Frame = {
    origin,
    ...eastNorth(origin),
    along: new Float64Array(count),
    eastward: new Float64Array(count),
    northward: new Float64Array(count),
  };
  projectMarks(marks, frame);
  return frame;
}

function projectMarks(marks: MarkSet, frame: Frame): void {
  const { direction: q, count } = marks;
  const { origin: n, east: e, north: m } = frame;
  for (let i = 0; i < count; i++) {
    const [qx, qy, qz] = [q[3 * i]!, q[3 * i + 1]!, q[3 * i + 2]!];
    frame.along[i] = qx * n[0] + qy * n[1] + qz * n[2];
    frame.eastward[i] = qx * e[0] + qy * e[1] + qz * e[2];
    frame.northward[i] = qx * m[0] + qy * m[1] + qz * m[2];
  }
}

/** The direction at offsets x, y on the tangent plane. */
export function centreAt({ origin: n, east: e, north: m }: Frame, x: number, y: number): Vector {
  return normalised(n[0] + x * e[0] + y * m[0], n[1] + x * e[1] + y * m[1], n[2] + x * e[2] + y * m[2]);
}

/** Move the frame's origin to the centre that p describes; p's offsets become zero. */
export function recentred(marks: MarkSet, frame: Frame, p: Float64Array): Frame {
  const moved = frameAt(marks, centreAt(frame, p[X]!, p[Y]!));
  p[X] = 0;
  p[Y] = 0;
  return moved;
}

/** What the model says about every mark at one set of parameters. Made once, filled many times. */
export interface Evaluation {
  /** Angle of the mark from the centre minus the expected radius, rad. */
  residual: Float64Array;
  /** Its derivatives, row by row: mark i, parameter j at i * parameters + j. */
  jacobian: Float64Array;
  /** Effective variance of the residual: positional error and spread of radii within the channel, rad^2. */
  variance: Float64Array;
  curve: CurveTable;
}

export function evaluation(marks: MarkSet, parameters: number): Evaluation {
  return {
    residual: new Float64Array(marks.count),
    jacobian: new Float64Array(marks.count * parameters),
    variance: new Float64Array(marks.count),
    curve: curveTable(marks.channels),
  };
}
