import type { FitOutcome } from '@/shared/contract/fits';
import type { FitExtra as EngineExtra } from '@/shared/shell/fitResult';

/** What the engine notes beside the numbers. All of it may be absent: fits are kept as they were made. */
export type FitExtra = FitOutcome['extra'] &
  Partial<
    Pick<
      EngineExtra,
      'scales' | 'tDof' | 'seLnVExp' | 'arcDeg' | 'channels' | 'sigmaUsedDeg' | 'bootstrap' | 'leastSquaresSe'
    >
  >;

export const extraOf = (fit: FitOutcome): FitExtra => fit.extra as FitExtra;

/** How many channels carried marks; older fits say so only by their rings. */
export const channelsOf = (fit: FitOutcome): number => extraOf(fit).channels ?? fit.rings.length;
