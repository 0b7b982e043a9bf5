import { evaluation, frameAt } from '@/shared/shell/frame';
import { readMarks } from '@/shared/shell/fitInput';
import { modelRing, type FittedShell } from '@/shared/shell/modelRing';
import { evaluate } from '@/shared/shell/residuals';
import { naturalValues } from '@/shared/shell/naturalParameters';
import { PARAMETER_NAMES } from '@/shared/shell/shellModel';
import { destination, unitVector } from '@/shared/sky/greatCircle';

const SHELL = { l: 359.7, b: 71, theta: 6, vSys: -12, vExp: 17 };
const WIDTH = 1.3;
const RAD = Math.PI / 180;
/** Some marks: a frame is made for a set of them. */
const ANY = {
  marks: Array.from({ length: 9 }, (_, i) => ({ l: i % 3, b: i * i, velocity: i, sigma: 0.1 })),
  channelWidth: 1,
};
const e = 0.3; // flattening of the elliptical model and the direction of its longer axis
const axis = 40;

/** Each model with its parameters as the fit holds them inside: the last two beside the five that all have. */
const models: [FittedShell['model'], number[]][] = [
  ['sphere', []],
  ['cap', []],
  ['drifting', [0.02 * RAD, -0.05 * RAD]],
  ['elliptical', [e * Math.cos(2 * axis * RAD), e * Math.sin(2 * axis * RAD)]],
];

test.each(models)('marks on the rings of a %s leave no residual', (model, extra) => {
  const p = Float64Array.from([0, 0, SHELL.theta * RAD, SHELL.vSys, Math.log(SHELL.vExp), ...extra]);
  const origin = unitVector({ lon: SHELL.l, lat: SHELL.b });
  const none = readMarks({ ...ANY, vSys: { value: 0 } }, 'cap');
  const values = naturalValues(model, { frame: frameAt(none, origin), p });
  const parameters = Object.fromEntries(
    PARAMETER_NAMES[model].map((name, a) => [name, { value: values[a]! }]),
  );
  const ring = modelRing({ model, parameters }, WIDTH);
  const marks = [-28.3, -20, -12, 1, 4.9].flatMap((velocity) =>
    [0, 75, 150, 220, 300].map((azimuth) => {
      const centre = ring.centreAt(velocity);
      const { lon, lat } = destination(centre, azimuth, ring.radiusAt(velocity, azimuth)!);
      return { l: lon, b: lat, velocity, sigma: 0.1 };
    }),
  );
  const input = { marks, channelWidth: WIDTH, vSys: { value: SHELL.vSys } };
  const set = readMarks(input, model);
  const out = evaluation(set, p.length);
  evaluate(model, set, frameAt(set, origin), p, out);
  for (const r of out.residual) expect(Math.abs(r)).toBeLessThan(1e-12);
});

test('beyond a cap there is no ring; a missing parameter is refused', () => {
  const parameters = Object.fromEntries(Object.entries(SHELL).map(([name, value]) => [name, { value }]));
  expect(modelRing({ model: 'sphere', parameters }, WIDTH).radiusAt(-12 + 18, 0)).toBeNull();
  expect(modelRing({ model: 'sphere', parameters }, WIDTH).reach(5)).toBe(1);
  expect(() => modelRing({ model: 'drifting', parameters }, WIDTH)).toThrow(/driftL/);
});
