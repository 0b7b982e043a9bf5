import type { FitOptions } from '@/shared/contract/fits';
import type { FitInput } from '@/shared/shell/fitInput';
import type { FrozenReading } from '../store/fits';

/** What the engine reads of frozen marks and of what was said before the fit. */
export const engineInput = (
  { channelWidth, marks, traced }: FrozenReading,
  { vSys, constraints }: Pick<FitOptions, 'vSys' | 'constraints'>,
): FitInput => ({
  channelWidth,
  marks: marks.map(({ l, b, velocity, sigma, placed }) => ({
    ...{ l, b, velocity },
    ...(sigma !== null && { sigma }),
    ...(placed === 'ring' && { drawn: true }),
  })),
  ...(vSys && { vSys }),
  ...(constraints && { constraints }),
  ...(traced && { traced }),
});
