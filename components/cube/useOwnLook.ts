import { useMemo, useRef, useState } from 'react';
import type { LookControl } from '@/components/cube/useLook';
import { OWN_LOOKS, type OwnKind } from '@/components/cube/useView';
import type { ChannelPlane } from '@/hooks/planes/decodePlane';
import { rampOf, type Palette } from '@/shared/image/palettes';
import type { Look, Tone } from '@/shared/image/tone';
import { windowOf } from '@/shared/image/windowPresets';

/** A window of such a picture leaves out a hundredth: single pixels at its edge would take the palette for themselves. */
const SHARE = 0.99;

interface Chosen {
  palette?: Palette;
  tone?: Tone;
  window?: readonly [number, number] | null;
}

/**
 * The look of a picture that is no channel: each kind keeps its own palette, tone and window. Its usual window is that
 * of the first picture of its kind, so that it does not flicker from channel to channel. null: a channel is shown.
 */
export function useOwnLook(
  kind: OwnKind | null,
  plane: ChannelPlane | null,
  channels: LookControl,
): LookControl | null {
  const [chosen, setChosen] = useState<Partial<Record<OwnKind, Chosen>>>({});
  const first = useRef<Partial<Record<OwnKind, readonly [number, number]>>>({});
  const own = useMemo(() => {
    if (!kind) return null;
    if (!plane || plane.standIn) return first.current[kind] ?? ([0, 1] as const);
    return (first.current[kind] ??= usualWindow(kind, plane));
  }, [kind, plane]);
  const { palette: usualPalette, tone: usualTone } = channels;
  return useMemo<LookControl | null>(() => {
    if (!kind || !own) return null;
    const mine = chosen[kind] ?? {};
    const palette = mine.palette ?? OWN_LOOKS[kind].palette ?? usualPalette;
    const tone = mine.tone ?? OWN_LOOKS[kind].tone ?? usualTone;
    const window = mine.window ?? own;
    const change = (more: Chosen) => setChosen((all) => ({ ...all, [kind]: { ...all[kind], ...more } }));
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
  }, [kind, chosen, own, usualPalette, usualTone]);
}

function usualWindow(kind: OwnKind, plane: ChannelPlane): readonly [number, number] {
  const [low, high] = windowOf(plane, SHARE) ?? [0, 1];
  if (!OWN_LOOKS[kind].aboutZero) return [low, high];
  const reach = Math.max(Math.abs(low), Math.abs(high));
  return [-reach, reach];
}
