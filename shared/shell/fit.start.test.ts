import { liveFit } from '@/shared/shell/fit';
import { modelRadius } from '@/shared/shell/channelCurve';
import { destination } from '@/shared/sky/greatCircle';

const shell = { theta: 1.6, vSys: -40, vExp: 14 };
const marks = [-50, -45, -40, -34].flatMap((velocity) =>
  Array.from({ length: 8 }, (_, i) => {
    const radius = modelRadius(velocity, 1, shell)! + 0.01 * Math.cos(5.1 * i + velocity);
    const at = destination({ lon: 118, lat: -3 }, 45 * i, radius);
    return { l: at.lon, b: at.lat, velocity };
  }),
);

test('a start given by hand leads to the same shell, and is what the fit says it began with', () => {
  const usual = liveFit({ marks, channelWidth: 1 });
  const start = { theta: 2.4, vSys: -46, vExp: 25 };
  const given = liveFit({ marks, channelWidth: 1 }, { start });
  for (const name of ['l', 'b', 'theta', 'vSys', 'vExp'])
    expect(given.parameters[name]!.value).toBeCloseTo(usual.parameters[name]!.value, 3);
  expect(given.provenance.startValues).toMatchObject({
    theta: expect.closeTo(2.4, 6),
    vSys: expect.closeTo(-46, 6),
    vExp: expect.closeTo(25, 6),
  });
});

test.each([{ theta: 0 }, { theta: 120 }, { vExp: -1 }, { vSys: NaN }])('refuses a start of %p', (wrong) => {
  const start = { theta: 1, vSys: -40, vExp: 10, ...wrong };
  expect(() => liveFit({ marks, channelWidth: 1 }, { start })).toThrow(
    expect.objectContaining({ type: 'invalid-input' }),
  );
});
