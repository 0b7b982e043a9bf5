import type { FitOutcome } from '@/shared/contract/fits';

/** A rim that rises less than one mark error above a straight line measures no radius: it never stands for a shell. */
const LEAST_RISE_SIGMA = 1;

export const isAdoptable = (outcome: Pick<FitOutcome, 'extra'>): boolean =>
  outcome.extra.riseSigma >= LEAST_RISE_SIGMA;
