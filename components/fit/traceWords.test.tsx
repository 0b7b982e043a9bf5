import type { TracedSector } from '@/shared/contract/traces';
import { rejections, seenWords } from './traceWords';

const sector = (rejected: TracedSector['rejected']) =>
  ({ rejected, radius: rejected === null ? 1 : null }) as TracedSector;
const sectors = [sector(null), sector('faint'), sector('outside'), sector('faint'), sector(null)];

test('rejected sectors are counted by reason, the most frequent first', () =>
  expect(rejections(sectors).map((r) => [r.words, r.sectors])).toEqual([
    ['does not stand above the noise', 2],
    ['off the map', 1],
  ]));

test('the share of the rim that was seen is said with its counts', () =>
  expect(seenWords({ sectors, seen: 0.4 })).toBe('A rim was found in 40 % of the sectors: 2 of 5.'));
