import { useDeferredValue, useMemo } from 'react';
import type { CubeAxes } from '@/shared/contract/cubes';
import type { LiveFit } from '@/hooks/reading/useLiveFit';
import { bestApart, whereNext, type NextChannel } from '@/shared/shell/suggest/whereNext';
import type { Wcs } from '@/shared/sky/wcs';

/** Channels nearer together than this share of v_exp are not both named. */
const APART = 0.15;

/** The unmarked channels where a ring would tell most, best first; none before there is a fit. */
export function useWhereNext(
  live: LiveFit,
  axes: CubeAxes,
  wcs: Wcs,
  usualSigma: number,
): readonly NextChannel[] {
  // Rings and fit follow the marks first.
  const { fit, marks } = useDeferredValue(live);
  const velocities = useMemo(
    () => Array.from({ length: axes.channels }, (_, k) => wcs.velocityOf(k)),
    [axes.channels, wcs],
  );
  return useMemo(() => {
    if (!fit) return [];
    const value = (name: string) => fit.parameters[name]!.value;
    const shell = {
      l: value('l'),
      b: value('b'),
      theta: value('theta'),
      vSys: value('vSys'),
      vExp: value('vExp'),
    };
    const channels = whereNext({
      marks,
      shell,
      channelWidth: axes.spectral.channelWidth,
      velocities,
      sigma: usualSigma,
      shared: Math.max(fit.extra.scales.ringDeg, 0),
    });
    return bestApart(channels, APART * shell.vExp);
  }, [fit, marks, axes, velocities, usualSigma]);
}
