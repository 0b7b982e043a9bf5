/**
 * Property tests draw the same cases in every ordinary run, so that a failure is the change's and not the day's.
 * FC_SEED=random (or a number) draws others; the seed of a failure is printed with it.
 */
import fc from 'fast-check';

const given = process.env.FC_SEED;
fc.configureGlobal({ seed: given === 'random' ? Date.now() % 2 ** 31 : Number(given ?? 20261201) });
