import { useMemo } from 'react';
import type { Seeing } from '@/components/seeing/seeing';
import type { SeenSky } from '@/components/seeing/useSeenSky';
import { isDone, type DoneFit } from '@/components/fit/fitFacts';
import { useFitMarks, useFits } from '@/hooks/useFits';
import { useTraces } from '@/hooks/useTraces';
import type { Shell } from '@/shared/contract/shells';
import type { Trace } from '@/shared/contract/traces';
import type { PictureLayers } from '@/shared/image/pictureLayers';
import { ringPath } from '@/shared/image/skyPath';
import { modelRadius } from '@/shared/shell/channelCurve';

export interface Layers {
  drawn: PictureLayers;
  /** Fits on this cube whose marks may be shown, newest first. */
  fits: readonly DoneFit[];
  /** The newest rim that was traced on this cube. */
  trace: Trace | null;
  /** There is something to show that is held back until the person has a fit of an own reading. */
  heldBack: boolean;
}

interface Input {
  cubeId: string;
  shell: Shell | null;
  shells: readonly Shell[];
  seen: SeenSky;
  channel: number;
  velocity: number;
  channelWidth: number;
  allChannels: boolean;
  mayMark: boolean;
  readingId: string | null;
  choice: Pick<Seeing, 'layers' | 'marksOf'>;
}

const NOTHING: PictureLayers = { traced: [], missed: [], shells: [], frozen: [] };

/**
 * What others marked, what was traced, and other shells, on the channel shown. A second reading is made without seeing
 * the first: who may mark sees marks and traced rims of this shell once there is a fit of the own reading.
 */
export function useLayers(input: Input): Layers {
  const { cubeId, shell, shells, seen, channel, velocity, channelWidth, allChannels, mayMark, readingId } =
    input;
  const { layers, marksOf } = input.choice;
  const all = useFits(shell?.id ?? null).data;
  const allTraces = useTraces(shell?.id ?? null).data;
  const known = useMemo(() => {
    const fits = all?.items.filter(isDone).filter((fit) => fit.cubeId === cubeId) ?? [];
    const traces = allTraces?.items.filter((t) => t.cubeId === cubeId && t.outcome) ?? [];
    const isOpen = !mayMark || fits.some((fit) => fit.readingId === readingId);
    return {
      fits: isOpen ? fits.filter((fit) => fit.traceId === null) : [],
      trace: isOpen ? (traces[0] ?? null) : null,
      heldBack: !isOpen && fits.length > 0,
    };
  }, [all, allTraces, cubeId, mayMark, readingId]);
  const { fits, trace } = known;
  const frozen = useFitMarks(
    marksOf !== null && fits.some((fit) => fit.id === marksOf) ? marksOf : null,
  ).data;
  const isTraced = layers.includes('traced');
  const withShells = layers.includes('shells');
  const { sky, nx, ny, fromImage, lie } = seen;

  const rim = useMemo(() => {
    const here = isTraced && !allChannels ? (trace?.outcome?.sectors ?? []) : [];
    return here
      .filter((s) => s.channel === channel)
      .flatMap(({ x, y, rejected }) => {
        const at = x === null || y === null ? null : fromImage({ x, y });
        return at ? [{ ...at, rejected }] : [];
      });
  }, [isTraced, allChannels, trace, channel, fromImage]);

  const rings = useMemo(() => {
    if (!withShells || lie === 'polar' || lie === 'stacked') return [];
    const onPicture = ({ lon, lat }: { lon: number; lat: number }) => sky.galacticToPixel(lon, lat);
    return shells.flatMap(({ id, name, adopted }) => {
      if (id === shell?.id || !adopted) return [];
      const { l, b, theta, vSys, vExp } = adopted;
      const model = { theta: theta.value, vSys: vSys.value, vExp: vExp.value };
      const radius = allChannels ? model.theta : modelRadius(velocity, channelWidth, model);
      if (radius === null || radius <= 0) return [];
      const centre = { lon: l.value, lat: b.value };
      const path = ringPath(centre, radius, onPicture, Math.max(nx, ny) / 2);
      return [{ name, path, at: onPicture(centre) }];
    });
  }, [withShells, lie, shells, shell?.id, sky, nx, ny, allChannels, velocity, channelWidth]);

  const drawn = useMemo<PictureLayers>(() => {
    const marks = allChannels ? [] : (frozen?.marks ?? []);
    const found = marks.flatMap((m) => (m.channel === channel ? (fromImage(m) ?? []) : []));
    if (rim.length === 0 && rings.length === 0 && found.length === 0) return NOTHING;
    return {
      traced: rim.filter((s) => s.rejected === null),
      missed: rim.filter((s) => s.rejected !== null),
      shells: rings,
      frozen: found,
    };
  }, [rim, rings, frozen, channel, allChannels, fromImage]);
  return useMemo(() => ({ ...known, drawn }), [known, drawn]);
}
