import type { SceneModel } from '@/components/cube/useScene';
import { degreesPerPixel } from '@/components/cube/Readout';
import type { ChannelReading } from '@/hooks/reading/skyMarks';
import type { CubeAxes } from '@/shared/contract/cubes';
import { lonLatOf, unitVector } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';

/**
 * What a trial model begins with: the model that is shown; else the rings there are, taken for the widest of a shell
 * that reaches a little beyond them; else a shell in the middle of the cube.
 */
export function firstGuess(
  axes: CubeAxes,
  wcs: Wcs,
  readings: readonly ChannelReading[],
  shown: SceneModel | null,
): SceneModel {
  if (shown) return shown;
  const [a, b] = axes.spectral.velocities;
  const rings = readings.flatMap(({ ring, velocity }) => (ring ? [{ ...ring, velocity }] : []));
  const span = Math.abs(b - a);
  if (rings.length === 0) {
    const centre = wcs.pixelToGalactic((axes.nx - 1) / 2, (axes.ny - 1) / 2) ?? { l: 0, b: 0 };
    const theta = degreesPerPixel(axes, wcs) * Math.min(axes.nx, axes.ny) * 0.25;
    return { ...centre, theta, vSys: (a + b) / 2, vExp: Math.max(span * 0.25, axes.spectral.channelWidth) };
  }
  const middle = rings.map(({ l, b: lat }) => unitVector({ lon: l, lat }));
  const sum = [0, 1, 2].map((i) => middle.reduce((total, v) => total + v[i]!, 0));
  const { lon, lat } = lonLatOf(sum as [number, number, number]);
  const widest = rings.reduce((one, other) => (other.theta > one.theta ? other : one));
  const reach = Math.max(...rings.map((r) => Math.abs(r.velocity - widest.velocity)));
  return {
    l: lon,
    b: lat,
    theta: widest.theta,
    vSys: widest.velocity,
    vExp: Math.max(1.2 * reach, span * 0.1, axes.spectral.channelWidth),
  };
}
