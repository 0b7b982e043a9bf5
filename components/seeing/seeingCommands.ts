import { useEffect, useRef } from 'react';
import type { CubeSession } from '@/components/cube/cubeSession';
import type { Command } from '@/components/ui/commands/command';

export const FLICK_KEY = 'f';

/** The keys of looking, beside those of the map and of marking. */
export function seeingCommands(s: CubeSession): Command[] {
  const { seeing, film, channel, view, model } = s;
  const onChannel = view === 'channel';
  const comparing = typeof seeing.other === 'number';
  return [
    {
      name: 'film.play',
      label: film.playing ? 'Stop playing' : 'Play the channels back and forth',
      keys: ['b'],
      group: 'Film',
      perform: film.toggle,
    },
    {
      name: 'film.other',
      label: 'Compare with the channel shown now',
      keys: ['c'],
      group: 'Film',
      enabled: onChannel,
      perform: () => seeing.change({ other: channel }),
    },
    {
      name: 'film.flick',
      label: 'Hold: see the channel compared with, or the model',
      keys: [FLICK_KEY],
      group: 'Film',
      enabled: onChannel && (comparing || model !== null),
      perform: () => seeing.setFlicking(true),
    },
    {
      name: 'film.difference',
      label: seeing.minus ? 'The channel itself' : 'Difference with the channel compared with',
      keys: ['d'],
      group: 'Film',
      enabled: onChannel && comparing,
      perform: () => seeing.change({ minus: !seeing.minus }),
    },
    {
      name: 'smooth.wider',
      label: 'Average two channels more',
      keys: [']'],
      group: 'Film',
      enabled: onChannel && seeing.mean + 2 <= Math.min(25, s.order.channels.length),
      perform: () => seeing.change({ mean: seeing.mean + 2 }),
    },
    {
      name: 'smooth.narrower',
      label: 'Average two channels fewer',
      keys: ['['],
      group: 'Film',
      enabled: seeing.mean > 1,
      perform: () => seeing.change({ mean: seeing.mean - 2 }),
    },
  ];
}

/** Flicking ends when the key is let go, wherever the focus is by then, and when the window is left. */
export function useFlickRelease({ seeing }: Pick<CubeSession, 'seeing'>): void {
  const release = useRef(seeing.setFlicking);
  release.current = seeing.setFlicking;
  useEffect(() => {
    if (typeof document === 'undefined' || !document.addEventListener) return;
    const onKeyUp = (e: KeyboardEvent) => e.key.toLowerCase() === FLICK_KEY && release.current(false);
    const onBlur = () => release.current(false);
    document.addEventListener('keyup', onKeyUp);
    globalThis.addEventListener?.('blur', onBlur);
    return () => {
      document.removeEventListener('keyup', onKeyUp);
      globalThis.removeEventListener?.('blur', onBlur);
    };
  }, []);
}
