import { DEGREE, eastNorth, lonLatOf, unitVector, type LonLat } from '@/shared/sky/greatCircle';
import { modelRadius } from '@/shared/shell/channelCurve';
import { normalised } from '@/shared/shell/markSet';
import type { ModelName } from '@/shared/shell/shellModel';

/** A fitted shell, as fits carry it: degrees, km/s. */
export interface FittedShell {
  model: ModelName;
  parameters: Readonly<Record<string, { readonly value: number }>>;
}

/** Where a fitted shell shows its ring at a velocity. */
export interface ModelRing {
  /** (v - v_sys)/v_exp: between -1 and 1 within the shell. */
  reach(velocity: number): number;
  /** Centre of the ring; it moves with velocity for a drifting shell. */
  centreAt(velocity: number): LonLat;
  /**
   * Radius in degrees, averaged over a channel, in a direction from that centre (degrees, north through east); null
   * where the channel lies beyond a cap. Only an elliptical shell's depends on the direction.
   */
  radiusAt(velocity: number, azimuth: number): number | null;
}

/**
 * The rings of a fitted shell of any model; the formulas are those of the residuals (residuals.ts,
 * ellipticalResiduals.ts), written in the parameters that a person reads.
 *
 * @param channelWidth full width of a channel, km/s
 * @throws RangeError where a parameter of the model is missing
 */
export function modelRing({ model, parameters }: FittedShell, channelWidth: number): ModelRing {
  const value = (name: string): number => {
    const found = parameters[name]?.value;
    if (found === undefined || !Number.isFinite(found))
      throw new RangeError(`The ${model} fit has no value of ${name}.`);
    return found;
  };
  const [vSys, vExp] = [value('vSys'), value('vExp')];
  const n = unitVector({ lon: value('l'), lat: value('b') });
  const { east, north } = eastNorth(n);
  const drift = model === 'drifting' ? [value('driftL') * DEGREE, value('driftB') * DEGREE] : [0, 0];
  const { theta, flattening, axis } = shapeOf(model, value);
  const shell = { theta, vSys, vExp };
  return {
    reach: (velocity) => (velocity - vSys) / vExp,
    centreAt(velocity) {
      const [x, y] = [drift[0]! * (velocity - vSys), drift[1]! * (velocity - vSys)];
      return lonLatOf(
        normalised(
          n[0] + x * east[0] + y * north[0],
          n[1] + x * east[1] + y * north[1],
          n[2] + x * east[2] + y * north[2],
        ),
      );
    },
    radiusAt(velocity, azimuth) {
      const round = modelRadius(velocity, channelWidth, shell);
      if (round === null || flattening === 0) return round;
      const stretched = Math.sqrt(1 - flattening * Math.cos(2 * (azimuth - axis) * DEGREE));
      return Math.asin(Math.min(Math.sin(round * DEGREE) / stretched, 1)) / DEGREE;
    },
  };
}

/** e of the elliptical model, the direction of its longer axis, and the radius of the round shell behind it. */
function shapeOf(model: ModelName, value: (name: string) => number) {
  const theta = value('theta');
  if (model !== 'elliptical') return { theta, flattening: 0, axis: 0 };
  const square = value('axisRatio') ** 2;
  const flattening = (1 - square) / (1 + square);
  const round = Math.asin(Math.sin(theta * DEGREE) * Math.sqrt(1 - flattening)) / DEGREE;
  return { theta: round, flattening, axis: value('positionAngle') };
}
