import { scatterSources } from './scatterWords';

const scales = { mark: 1.21, spread: 0.81, ringDeg: 0.024, shiftDeg: -0.01 };
const words = (s: Partial<typeof scales> = {}, stated = true) =>
  Object.fromEntries(scatterSources({ ...scales, ...s }, 0.03, stated).map((x) => [x.key, x.sentence]));

test('each source is said in units of the stated error', () => {
  expect(words().mark).toBe(
    'Marks scatter about their own ring by 1.1 times your stated error of 0.03°, as stated.',
  );
  expect(words().ring).toContain('Your rings differ in radius by 0.8 of your stated error');
  expect(words().spread).toContain('0.9 times what the model expects');
});

test('an estimated variance below nought is no difference, not a negative one', () => {
  expect(words().shift).toContain('Your rings share one centre');
  expect(words({ ringDeg: -0.02 }).ring).toContain('Your rings agree in radius');
  expect(scatterSources({ ...scales, ringDeg: -0.02 }, 0.03, true)[2]!.ratio).toBeNull();
});

test('a stated error that is off by half is told so', () => {
  expect(words({ mark: 4 }).mark).toContain('2.0 times your stated error of 0.03°, so you were less sure');
  expect(words({ mark: 0.25 }).mark).toContain('surer than you said');
});

test('marks without an error of their own are not told that they stated one', () => {
  const all = Object.values(words({}, false)).join(' ');
  expect(all).toContain('no error of their own');
  expect(all).not.toContain('stated');
});

test('a traced rim is nobody’s marks', () => {
  const all = scatterSources({ ...scales, mark: 0.01 }, 0.03, true, true)
    .map((x) => x.sentence)
    .join(' ');
  expect(all).toContain('Traced rings differ in radius by 0.8 of the error of a traced point');
  expect(all).not.toMatch(/your|stated|surer/i);
});
