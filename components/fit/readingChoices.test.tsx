import type { Shell } from '@/shared/contract/shells';
import type { Trace } from '@/shared/contract/traces';
import { readingChoices } from './readingChoices';

const reading = (id: string, mine: boolean) => ({
  id,
  mine,
  marks: 40,
  channels: 5,
  person: { id, name: 'Ada' },
});
const shell = {
  readings: [reading('m', true), reading('o', false), reading('t', false)],
} as unknown as Shell;
const traces = [
  { readingId: 't', edge: 'inner', createdAt: new Date().toISOString() },
  { readingId: null, edge: 'ridge', createdAt: new Date().toISOString() },
] as Trace[];

test('my marks and finished traces can be fitted; another person’s only where they were fitted before', () => {
  expect(readingChoices(shell, traces, 'm')).toEqual([
    { value: 'm', label: 'My marks: 40 marks on 5 channels' },
    { value: 't', label: 'Traced rim: inner edge, just now' },
  ]);
  expect(readingChoices(shell, traces, 'o')[1]).toEqual({
    value: 'o',
    label: 'Marks of Ada: 40 marks on 5 channels',
  });
  expect(readingChoices(shell, traces, 'new')[0]).toEqual({ value: 'new', label: 'My marks' });
});
