import { useCallback, useMemo, useState } from 'react';
import type { SceneModel } from '@/components/cube/useScene';
import type { RingParameters } from '@/shared/shell/channelCurve';

export interface TrialModel {
  /** A model set by hand on the diagram; null while the fit, or nothing, is shown. */
  trial: SceneModel | null;
  /** Begin with what is shown, or with a guess. */
  beginTrial: () => void;
  changeTrial: (by: Partial<RingParameters>) => void;
  /** Show the fit again, worked out from these values or, with false, from the usual ones. */
  endTrial: (fromHere: boolean) => void;
  /** What the live fit starts from; null: the usual start values. */
  fitStart: RingParameters | null;
}

/** A model set by hand: it moves the rings on the map, and gives the fit its start values. */
export function useTrial(guess: () => SceneModel): TrialModel {
  const [trial, setTrial] = useState<SceneModel | null>(null);
  const [fitStart, setStart] = useState<RingParameters | null>(null);
  const beginTrial = useCallback(() => setTrial((before) => before ?? guess()), [guess]);
  const changeTrial = useCallback(
    (by: Partial<RingParameters>) => setTrial((before) => ({ ...(before ?? guess()), ...by })),
    [guess],
  );
  const endTrial = useCallback(
    (fromHere: boolean) => {
      setStart(fromHere && trial ? { theta: trial.theta, vSys: trial.vSys, vExp: trial.vExp } : null);
      setTrial(null);
    },
    [trial],
  );
  return useMemo(
    () => ({ trial, beginTrial, changeTrial, endTrial, fitStart }),
    [trial, beginTrial, changeTrial, endTrial, fitStart],
  );
}
