import { useMemo } from 'react';
import type { SceneModel } from '@/components/cube/useScene';
import { isDone, type DoneFit } from '@/components/fit/fitFacts';
import type { LiveFit } from '@/hooks/reading/useLiveFit';
import { useFits } from '@/hooks/useFits';
import type { Shell } from '@/shared/contract/shells';

export interface ShownModel {
  /** What the map and the diagram show as the model, and where it is from. */
  model: SceneModel | null;
  modelSource: 'trial' | 'live' | 'record' | null;
  /** The fit of record that is shown because there is no live one. */
  shownRecord: DoneFit | null;
}

/**
 * The live fit, or a fit of record where there is none: any for who only looks, but to who marks only the one made
 * from the own reading, because a second reading is made without seeing the first.
 */
export function useModel(
  shell: Shell | null,
  live: LiveFit,
  mayMark: boolean,
  readingId: string | null,
  trial: SceneModel | null,
): ShownModel {
  const { data } = useFits(shell?.id ?? null);
  const { fit } = live;
  return useMemo(() => {
    const own = data?.items.filter(isDone).filter((f) => !mayMark || f.readingId === readingId) ?? [];
    const record = fit ? null : (own.find((f) => f.adopted) ?? own[0] ?? null);
    const model = trial ?? sceneModel(fit?.parameters ?? record?.parameters);
    const modelSource = !model ? null : trial ? 'trial' : fit ? 'live' : 'record';
    return { model, modelSource, shownRecord: record };
  }, [data, fit, mayMark, readingId, trial]);
}

/** The numbers that place a model's rings; null where a fit lacks one. */
function sceneModel(parameters: Record<string, { value: number }> | undefined): SceneModel | null {
  const [l, b, theta, vSys, vExp] = ['l', 'b', 'theta', 'vSys', 'vExp'].map(
    (name) => parameters?.[name]?.value,
  );
  if (l === undefined || b === undefined || theta === undefined || vSys === undefined || vExp === undefined)
    return null;
  return { l, b, theta, vSys, vExp };
}
