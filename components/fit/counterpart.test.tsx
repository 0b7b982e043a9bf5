import type { Trace } from '@/shared/contract/traces';
import { counterpart } from './counterpart';
import type { DoneFit } from './fitFacts';

const numbers = { l: {}, b: {}, theta: {}, vSys: {}, vExp: {} };
const fit = (id: string, traceId: string | null = null, parameters: object = numbers) =>
  ({ id, traceId, parameters }) as unknown as DoneFit;
const traces = [
  { id: 't', fitId: 'a' },
  { id: 'u', fitId: 'b' },
] as Trace[];
const [a, b, ofA, ofAOld] = [fit('a'), fit('b'), fit('x', 't'), fit('y', 't')];

test('marks and the newest fit of the rim traced around them find each other', () => {
  const fits = [ofA, ofAOld, b, a];
  expect(counterpart(a, fits, traces)).toEqual({ marked: a, traced: ofA });
  expect(counterpart(ofAOld, fits, traces)).toEqual({ marked: a, traced: ofAOld });
});

test('a rim traced around another fit is no counterpart', () => {
  expect(counterpart(b, [ofA, a, b], traces)).toBeNull();
  expect(counterpart(ofA, [ofA, b], traces)).toBeNull();
  expect(counterpart(ofA, [ofA, fit('a', null, { theta: {} })], traces)).toBeNull();
});
