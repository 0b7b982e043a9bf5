import { useCallback, useMemo, useState } from 'react';
import type { Lie, Seeing } from '@/components/seeing/seeing';

export interface SeeingControl extends Seeing {
  change: (more: Partial<Seeing>) => void;
  /** Choose how the sky lies in the picture, about a place: see `aboutOf`. */
  setLie: (lie: Lie, about: Seeing['about']) => void;
  /** While a key or a button is held: the other channel, or the model. */
  flicking: boolean;
  setFlicking: (on: boolean) => void;
}

export function useSeeing(start: Seeing): SeeingControl {
  const [seeing, setSeeing] = useState(start);
  const [flicking, setFlicking] = useState(false);
  const change = useCallback((more: Partial<Seeing>) => setSeeing((now) => ({ ...now, ...more })), []);
  const setLie = useCallback(
    (lie: Lie, about: Seeing['about']) =>
      setSeeing((now) => ({ ...now, lie: about ? lie : 'image', about: lie === 'image' ? null : about })),
    [],
  );
  return useMemo(
    () => ({ ...seeing, change, setLie, flicking, setFlicking }),
    [seeing, change, setLie, flicking],
  );
}
