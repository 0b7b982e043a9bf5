import { useMemo, useState } from 'react';
import type { LookControl } from '@/components/cube/useLook';
import { VIEWS, type View } from '@/components/cube/views';
import { useMapPlane } from '@/hooks/planes/useMapPlane';
import type { Planes } from '@/hooks/planes/usePlanes';
import type { Cube, MapKind } from '@/shared/contract/cubes';
import { rampOf, type Palette } from '@/shared/image/palettes';
import type { Look, Tone } from '@/shared/image/tone';
import { windowOf } from '@/shared/image/windowPresets';

/** A map's window leaves out a hundredth: single pixels at its edge would take the palette for themselves. */
const SHARE = 0.99;

interface Chosen {
  palette?: Palette;
  tone?: Tone;
  window?: readonly [number, number] | null;
}

export interface ViewControl {
  view: View;
  setView: (view: View) => void;
  /** The look of the map shown; null while a channel is. */
  look: LookControl | null;
  planes: Planes;
}

/** Which picture is shown, and how a map of all channels looks: each kind keeps its own palette, tone and window. */
export function useView(cube: Cube, start: MapKind | null, channels: LookControl): ViewControl {
  const [view, setView] = useState<View>(start ?? 'channel');
  const [chosen, setChosen] = useState<Partial<Record<View, Chosen>>>({});
  const planes = useMapPlane(cube, view === 'channel' ? null : view);
  const { plane } = planes;
  const own = useMemo(() => (plane && windowOf(plane, SHARE)) ?? ([0, 1] as const), [plane]);
  const { palette: usualPalette, tone: usualTone } = channels;
  const look = useMemo<LookControl | null>(() => {
    if (view === 'channel') return null;
    const mine = chosen[view] ?? {};
    const palette = mine.palette ?? VIEWS[view].palette ?? usualPalette;
    const tone = mine.tone ?? VIEWS[view].tone ?? usualTone;
    const window = mine.window ?? own;
    const change = (more: Chosen) => setChosen((all) => ({ ...all, [view]: { ...all[view], ...more } }));
    const drawn: Look = { window: [window[0], window[1]], tone, ramp: rampOf(palette), blank: 0 };
    return {
      look: drawn,
      palette,
      tone,
      window,
      usual: !mine.window,
      setPalette: (p) => change({ palette: p }),
      setTone: (t) => change({ tone: t }),
      setWindow: (w) => change({ window: w }),
    };
  }, [view, chosen, own, usualPalette, usualTone]);
  return { view, setView, look, planes };
}
