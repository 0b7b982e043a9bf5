import { useCallback, useDeferredValue, useMemo, useState } from 'react';
import { degreesPerPixel } from '@/components/cube/Readout';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import type { PlacedMark } from '@/hooks/reading/placedMark';
import type { ChannelReading } from '@/hooks/reading/skyMarks';
import type { CubeAxes } from '@/shared/contract/cubes';
import { dequantise } from '@/shared/image/quantise';
import { suggestMarks, type Suggestion } from '@/shared/shell/suggest/suggestMarks';
import type { Wcs } from '@/shared/sky/wcs';

export interface Ghost extends Suggestion {
  id: string;
}

export interface Suggestions {
  /** Whether marks are offered. */
  suggesting: boolean;
  setSuggesting: (on: boolean) => void;
  ghosts: readonly Ghost[];
  refuse: (ids: readonly string[]) => void;
}

interface Input {
  /** The channel shown, as it has been loaded; null while there is none, or nothing may be marked. */
  plane: ChannelPlane | null;
  axes: CubeAxes;
  wcs: Wcs;
  marks: readonly PlacedMark[];
  readings: readonly ChannelReading[];
}

/** Where the header names no beam, pixels of this many a beam are taken. */
const PIXELS_A_BEAM = 3;
const NONE: readonly Ghost[] = [];

/** Marks to offer on the channel shown, once three marks make a ring there; what was refused is not offered again. */
export function useSuggestions({ plane, axes, wcs, marks, readings }: Input): Suggestions {
  const [suggesting, setSuggesting] = useState(true);
  const [refused, setRefused] = useState<ReadonlySet<string>>(new Set());
  const ring = readings.find((r) => r.channel === plane?.channel)?.ring ?? null;
  // Once a picture and a ring: the map follows the hand first.
  const [shown, about] = [useDeferredValue(suggesting && ring ? plane : null), useDeferredValue(ring)];
  const values = useMemo(() => shown && dequantise(shown), [shown]);
  const found = useMemo(() => {
    if (!shown || !values || !about) return [];
    const pixelDeg = degreesPerPixel(axes, wcs);
    const { beam } = axes;
    return suggestMarks({
      channel: shown.channel,
      plane: { values, nx: shown.width, ny: shown.height, block: shown.block },
      wcs,
      ring: about,
      marks: marks.flatMap((m) => {
        const at = m.channel === shown.channel ? wcs.pixelToGalactic(m.x, m.y) : null;
        return at ? [{ lon: at.l, lat: at.b }] : [];
      }),
      beamDeg: beam ? Math.sqrt(beam.major * beam.minor) : PIXELS_A_BEAM * pixelDeg,
      pixelDeg,
    }).map((s) => ({ ...s, id: `${shown.channel}-${s.sector}` }));
  }, [shown, values, about, marks, axes, wcs]);
  const ghosts = useMemo(
    () => (shown === plane ? found.filter((ghost) => !refused.has(ghost.id)) : NONE),
    [found, refused, shown, plane],
  );
  const refuse = useCallback(
    (ids: readonly string[]) => setRefused((before) => new Set([...before, ...ids])),
    [],
  );
  return { suggesting, setSuggesting, ghosts, refuse };
}
