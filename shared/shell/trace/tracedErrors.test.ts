import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fitShell } from '@/shared/shell/fit';
import { readMarks, type FitInput } from '@/shared/shell/fitInput';
import { subset } from '@/shared/shell/markSet';

const load = (name: string): FitInput =>
  JSON.parse(readFileSync(join(__dirname, '../../../tests/reference/shells/cases', `${name}.json`), 'utf8'));
const marks = load('01-full-8x10');
const traced = { beamDeg: 0.15, faint: false };

test('blocks of 5 km/s from the lowest velocity share errors; a person’s marks share those of their channel', () => {
  const person = readMarks(marks, 'sphere');
  expect(person.block).toEqual(person.channel);
  expect(person.unseen).toBeNull();
  const rim = readMarks({ ...marks, traced }, 'sphere');
  const first = rim.velocity[0]!;
  const blocks = [...new Set(Array.from(rim.velocity, (v) => Math.floor((v - first) / 5 + 1e-9)))];
  expect(rim.blocks).toBe(blocks.length);
  expect(rim.blocks).toBeLessThan(rim.channels);
  for (let i = 0; i < rim.count; i++)
    expect(blocks[rim.block[i]!]).toBe(Math.floor((rim.velocity[rim.channel[i]!]! - first) / 5 + 1e-9));
  const upper = subset(rim, (i) => rim.block[i]! > 0);
  expect(upper.blocks).toBe(rim.blocks - 1);
  expect(Math.min(...upper.block)).toBe(0);
  expect(upper.unseen).toBe(rim.unseen);
});

test('a traced rim has the same shell and what its scatter does not show added in quadrature', () => {
  const person = fitShell(marks);
  // channels 5 km/s apart are blocks by themselves: only what is added differs
  const wide = {
    ...marks,
    marks: marks.marks.map((m) => ({ ...m, velocity: 5 * m.velocity })),
    channelWidth: 5,
  };
  const plain = fitShell(wide);
  const rim = fitShell({ ...wide, traced });
  const faint = fitShell({ ...wide, traced: { ...traced, faint: true } });
  for (const name of ['l', 'b', 'theta', 'vSys', 'vExp']) {
    expect(rim.parameters[name]!.value).toBe(plain.parameters[name]!.value);
    const added = {
      l: 0,
      b: 0,
      theta: 0.1 * traced.beamDeg,
      vSys: 0.3,
      vExp: 0.03 * plain.parameters.vExp!.value,
    }[name]!;
    expect(rim.parameters[name]!.se).toBeCloseTo(Math.hypot(plain.parameters[name]!.se!, added), 9);
  }
  expect(faint.parameters.theta!.se).toBeCloseTo(
    Math.hypot(plain.parameters.theta!.se!, 0.2 * traced.beamDeg),
    9,
  );
  expect(rim.extra.tDof.vExp).toBeGreaterThan(plain.extra.tDof.vExp!);
  expect(fitShell({ ...marks, traced }).parameters.theta!.value).toBeCloseTo(
    person.parameters.theta!.value,
    9,
  );
});

test('the draws of a traced rim are as wide', () => {
  const options = { bootstrap: 500, optimiser: 'live' } as const;
  const rim = fitShell({ ...marks, traced: { beamDeg: 0.5, faint: false } }, options);
  for (const name of ['theta', 'vSys', 'vExp']) {
    const { lo, hi, se } = rim.parameters[name]!;
    expect((hi! - lo!) / 2 / se!).toBeGreaterThan(0.85);
    expect((hi! - lo!) / 2 / se!).toBeLessThan(1.2);
  }
});

test('v_sys that is held gets no error', () => {
  const cap = { ...load('04-cap-near-prior'), vSys: { value: -40, sigma: 0 }, traced };
  const fit = fitShell(cap, { model: 'cap', bootstrap: 50, optimiser: 'live' });
  expect(fit.parameters.vSys).toMatchObject({ value: -40, se: 0, lo: -40, hi: -40 });
});

test('a traced rim without a beam is refused', () => {
  expect(() => fitShell({ ...marks, traced: { beamDeg: 0, faint: false } })).toThrow(/beam/);
});
