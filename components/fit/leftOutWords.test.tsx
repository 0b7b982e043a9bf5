import type { LeftOut } from '@/shared/contract/fits';
import { mostMoved } from './leftOutWords';

const row = (velocity: number, shiftInSe: LeftOut['shiftInSe'], problem?: string): LeftOut => ({
  velocity,
  marks: 8,
  shift: {},
  shiftInSe,
  score: 1,
  ...(problem && { problem }),
});

test('the channel that carries most is named with the parameter it moves', () =>
  expect(mostMoved([row(-45, { theta: 0.2, vExp: 0.4 }), row(-32.5, { theta: -0.3, vExp: -2.31 })])).toBe(
    'The channel at −32.5 km/s carries most: without it v_exp moves by −2.3 standard errors.',
  ));

test('small shifts are said to be small', () =>
  expect(mostMoved([row(-45, { theta: 0.2 })])).toContain('No parameter moves by a standard error'));

test('a channel without which nothing can be fitted is not passed over', () => {
  expect(mostMoved([row(-45, { theta: 0.2 }), row(-40, {}, 'two channels are too few')])).toContain(
    'Without one of the channels there is no fit at all.',
  );
  expect(mostMoved([row(-40, {}, 'too few')])).toContain('No channel could be left out.');
});
