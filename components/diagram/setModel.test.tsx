import { diagramLayout } from '@/components/diagram/diagramScale';
import { draggedTo, handleAt, keyed } from '@/components/diagram/setModel';

const domain = { velocity: [-70, 0] as const, radius: 3, residual: 0.2 };
const l = diagramLayout(domain, 340, 300, true);
const model = { theta: 2, vSys: -40, vExp: 20 };

test('a handle brought to where another model has it makes that model', () => {
  const other = { theta: 2.5, vSys: -31, vExp: 15 };
  const crown = draggedTo('crown', handleAt('crown', other, l), model, l, domain, 1);
  expect(crown.theta).toBeCloseTo(2.5, 9);
  expect(crown.vSys).toBeCloseTo(-31, 9);
  for (const foot of ['low', 'high'] as const) {
    const wider = { ...model, vExp: 27 };
    expect(draggedTo(foot, handleAt(foot, wider, l), model, l, domain, 1).vExp).toBeCloseTo(27, 9);
  }
});

test('a handle stays within the axes, and a foot never passes the crown', () => {
  expect(draggedTo('crown', { x: -500, y: -900 }, model, l, domain, 1)).toEqual({ vSys: -70, theta: 3 });
  expect(draggedTo('crown', { x: 100, y: 9000 }, model, l, domain, 1).theta).toBeGreaterThan(0);
  expect(draggedTo('low', { x: l.right, y: 0 }, model, l, domain, 1)).toEqual({ vExp: 0.5 });
});

test('arrow keys move crown and feet, with Shift further; other keys are not theirs', () => {
  expect(keyed('crown', 'ArrowRight', false, model, 1)).toEqual({ vSys: -39 });
  expect(keyed('crown', 'ArrowLeft', true, model, 1)).toEqual({ vSys: -45 });
  const up = keyed('crown', 'ArrowUp', false, model, 1)!.theta!;
  expect(keyed('crown', 'ArrowDown', false, { ...model, theta: up }, 1)!.theta).toBeCloseTo(2, 12);
  expect(keyed('low', 'ArrowLeft', false, model, 1)).toEqual({ vExp: 21 });
  expect(keyed('high', 'ArrowLeft', false, model, 1)).toEqual({ vExp: 19 });
  expect(keyed('high', 'ArrowDown', true, { ...model, vExp: 2 }, 1)).toEqual({ vExp: 0.5 });
  expect(keyed('high', 'Enter', false, model, 1)).toBeNull();
});
