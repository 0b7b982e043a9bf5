import { useCallback, useMemo, useState } from 'react';
import type { CubePlace } from '@/components/cube/place';
import { PALETTES, rampOf, type Palette } from '@/shared/image/palettes';
import { TONES, type Look, type Tone } from '@/shared/image/tone';

export interface LookControl {
  look: Look;
  palette: Palette;
  tone: Tone;
  window: readonly [number, number];
  /** Whether the window is the cube's own. */
  usual: boolean;
  setPalette: (palette: Palette) => void;
  setTone: (tone: Tone) => void;
  /** null goes back to the cube's own window. */
  setWindow: (window: readonly [number, number] | null) => void;
}

const KEY = 'outswell.look';

/** Palette and tone are a person's habit and kept in this browser; the window belongs to the cube. */
function habit(): { palette: Palette; tone: Tone } {
  try {
    const kept = JSON.parse(globalThis.localStorage?.getItem(KEY) ?? '{}') as {
      palette?: string;
      tone?: string;
    };
    return {
      palette: PALETTES.find((p) => p === kept.palette) ?? 'Ink',
      tone: TONES.find((t) => t === kept.tone) ?? 'arcsinh',
    };
  } catch {
    return { palette: 'Ink', tone: 'arcsinh' };
  }
}

function keep(palette: Palette, tone: Tone): void {
  try {
    globalThis.localStorage?.setItem(KEY, JSON.stringify({ palette, tone }));
  } catch {
    /* then it lasts until the page is left */
  }
}

export function useLook(start: CubePlace, own: readonly [number, number]): LookControl {
  const [chosen, setChosen] = useState(() => {
    const usual = habit();
    return { palette: start.palette ?? usual.palette, tone: start.tone ?? usual.tone };
  });
  const [changed, setChanged] = useState<readonly [number, number] | null>(start.window);
  const [low, high] = changed ?? own;
  const { palette, tone } = chosen;
  const ramp = useMemo(() => rampOf(palette), [palette]);
  const look = useMemo<Look>(() => ({ window: [low, high], tone, ramp, blank: 0 }), [low, high, tone, ramp]);
  const choose = useCallback((next: { palette: Palette; tone: Tone }) => {
    keep(next.palette, next.tone);
    setChosen(next);
  }, []);
  return useMemo(
    () => ({
      look,
      palette,
      tone,
      window: [low, high] as const,
      usual: changed === null,
      setPalette: (p: Palette) => choose({ palette: p, tone }),
      setTone: (t: Tone) => choose({ palette, tone: t }),
      setWindow: setChanged,
    }),
    [look, palette, tone, low, high, changed, choose],
  );
}
