import { modelRadius } from '@/shared/shell/channelCurve';
import type { FittedShell } from '@/shared/shell/modelRing';
import { traceChannel } from '@/shared/shell/trace/traceChannel';
import { traceOutcome, tracedInput } from '@/shared/shell/trace/traceOutcome';
import { planTrace, type TraceTask } from '@/shared/shell/trace/tracePlan';
import { traceRim } from '@/shared/shell/trace/traceRim';
import { positionAngle, separation } from '@/shared/sky/greatCircle';
import { buildWcs } from '@/shared/sky/wcs';
import { wcsOfRecipe } from '@/shared/synthetic/wcsOfRecipe';

const SHAPE = { nx: 120, ny: 110, channels: 33 };
const BEAM = 0.15;
const PIXEL = 0.05;
const CENTRE = { l: 0.1, b: 40 }; // across longitude 0, where a parallel is no great circle
const SHELL = { ...CENTRE, theta: 1.6, vSys: 5, vExp: 14 };
const NOISE = 0.01;

const wcs = buildWcs(
  wcsOfRecipe({
    shape: SHAPE,
    sky: { projection: 'SFL', centre: { l: 0, b: 40 }, pixel: PIXEL },
    velocity: { first: -11, step: 1 },
  }),
);
const fitOf = (shell: Record<string, number>, model: FittedShell['model'] = 'sphere'): FittedShell => ({
  model,
  parameters: Object.fromEntries(Object.entries(shell).map(([name, value]) => [name, { value }])),
});
const task: TraceTask = {
  shape: SHAPE,
  wcs,
  fit: fitOf({ ...SHELL, theta: 1.5, l: 0.13 }), // not where the rim is
  edge: 'ridge',
  noise: NOISE,
  beam: { majorDeg: BEAM, minorDeg: BEAM },
};

const CREST = 0.12; // standard deviation of the rim along the radius, degrees
/** Distance from the shell's centre and direction of each pixel. */
const pixels = Array.from({ length: SHAPE.nx * SHAPE.ny }, (_, i) => {
  const { l, b } = wcs.pixelToGalactic(i % SHAPE.nx, Math.floor(i / SHAPE.nx))!;
  const [from, to] = [
    { lon: CENTRE.l, lat: CENTRE.b },
    { lon: l, lat: b },
  ];
  return { angle: separation(from, to), azimuth: positionAngle(from, to) };
});

/** A channel with a rim of Gaussian profile at radius(azimuth), on gas that slopes across the map. */
function planeWith(radius: (azimuth: number) => number, brightness: (azimuth: number) => number = () => 1) {
  return Float32Array.from(pixels, ({ angle, azimuth }, i) => {
    const off = (angle - radius(azimuth)) / CREST;
    return 3 + 0.02 * (i % SHAPE.nx) + brightness(azimuth) * Math.exp(-0.5 * off * off);
  });
}
const radiusFound = (s: { l: number | null; b: number | null }) =>
  separation({ lon: CENTRE.l, lat: CENTRE.b }, { lon: s.l!, lat: s.b! });
const channelAt = (velocity: number) => Math.round(wcs.channelOf(velocity));

test('the ridge is found where it is, at every azimuth, whatever the slope of the gas', () => {
  const sectors = traceChannel(
    planTrace(task),
    channelAt(5),
    planeWith(() => 1.6),
  );
  expect(sectors).toHaveLength(24);
  expect(sectors.map((s) => s.rejected)).toEqual(sectors.map(() => null));
  for (const s of sectors) {
    expect(Math.abs(radiusFound(s) - 1.6)).toBeLessThan(0.05 * BEAM);
    const pixel = wcs.galacticToPixel(s.l!, s.b!)!;
    expect(s.x).toBeCloseTo(pixel.x, 9);
    expect(s.y).toBeCloseTo(pixel.y, 9);
  }
  expect(sectors[0]!.azimuth).toBe(7.5);
});

test('the inner edge is the steepest rise: one standard deviation inside the ridge', () => {
  const plan = planTrace({ ...task, edge: 'inner' });
  const sectors = traceChannel(
    plan,
    channelAt(5),
    planeWith(() => 1.6),
  );
  // smoothing by half a beam has widened the rim
  const width = Math.hypot(CREST, BEAM / 2.3548 / 2);
  for (const s of sectors) expect(Math.abs(radiusFound(s) - (1.6 - width))).toBeLessThan(0.08 * BEAM);
});

test('each reason of rejection', () => {
  const plan = planTrace({ ...task, noise: 0.2 });
  const reasons = (plane: Float32Array) =>
    new Set(traceChannel(plan, channelAt(5), plane).map((s) => s.rejected));
  expect(
    reasons(
      planeWith(
        () => 1.6,
        (azimuth) => (azimuth < 180 ? 4 : 0.25),
      ),
    ),
  ).toEqual(new Set([null, 'faint']));
  expect(reasons(new Float32Array(SHAPE.nx * SHAPE.ny))).toEqual(new Set(['at-end'])); // no highest point: the first
  const holed = planeWith(
    () => 1.6,
    () => 4,
  );
  const place = wcs.galacticToPixel(CENTRE.l, CENTRE.b + 1.6)!;
  for (const [dx, dy] of [-1, 0, 1].flatMap((x) => [-1, 0, 1].map((y) => [x, y] as const)))
    holed[(Math.round(place.y) + dy) * SHAPE.nx + Math.round(place.x) + dx] = NaN;
  const blank = traceChannel(plan, channelAt(5), holed).filter((s) => s.rejected === 'blank');
  expect(blank.map((s) => s.azimuth)).toEqual([7.5, 352.5]);
  for (const s of blank) expect([s.radius, s.l, s.x, s.sigma]).toEqual([null, null, null, null]);
});

test('a shell that runs off the map is traced where the map has it', () => {
  const beside = { ...task, fit: fitOf({ ...SHELL, l: 358.2 }) };
  const sectors = traceChannel(
    planTrace(beside),
    channelAt(5),
    planeWith(() => 1.6),
  );
  const outside = sectors.filter((s) => s.rejected === 'outside').map((s) => s.azimuth);
  expect(outside.length).toBeGreaterThan(4);
  expect(outside.every((azimuth) => azimuth > 180)).toBe(true); // smaller longitudes lie to the west
});

test('windows follow a drifting and an elliptical shell', () => {
  const drifting = fitOf({ ...SHELL, driftL: 0.03, driftB: -0.02 }, 'drifting');
  const ring = planTrace({ ...task, fit: drifting }).ring;
  const moved = ring.centreAt(15);
  expect(separation({ lon: CENTRE.l, lat: CENTRE.b }, moved)).toBeCloseTo(10 * Math.hypot(0.03, 0.02), 3);
  expect(ring.radiusAt(5, 10)).toBeCloseTo(modelRadius(5, wcs.velocityStep, SHELL)!, 12);

  const elliptical = fitOf({ ...SHELL, axisRatio: 0.7, positionAngle: 30 }, 'elliptical');
  const plan = planTrace({ ...task, fit: elliptical });
  const long = plan.ring.radiusAt(5, 30)!;
  expect(plan.ring.radiusAt(5, 210)).toBeCloseTo(long, 12);
  // sin^2 of the shorter axis over that of the longer: (1 - e)/(1 + e) = q^2
  expect(
    Math.sin((plan.ring.radiusAt(5, 120)! * Math.PI) / 180) / Math.sin((long * Math.PI) / 180),
  ).toBeCloseTo(0.7, 9);
  const sectors = traceChannel(
    plan,
    channelAt(5),
    planeWith((azimuth) => plan.ring.radiusAt(5, azimuth)!),
  );
  for (const s of sectors) expect(Math.abs(s.radius! - s.predicted)).toBeLessThan(0.1 * BEAM);
});

test('without a beam three pixels are taken, and it is said', () => {
  const plan = planTrace({ ...task, beam: null });
  expect(plan.beamDeg).toBeCloseTo(3 * PIXEL, 3);
  const outcome = traceOutcome(
    plan,
    traceChannel(
      plan,
      channelAt(5),
      planeWith(() => 1.6),
    ),
  );
  expect(outcome).toMatchObject({ beamAssumed: true, beamDeg: plan.beamDeg });
});

test('what cannot be traced is refused', () => {
  const refused = (change: Partial<TraceTask>) => {
    try {
      planTrace({ ...task, ...change });
    } catch (problem) {
      return problem;
    }
    throw new Error('it was accepted');
  };
  expect(refused({ noise: NaN })).toMatchObject({ type: 'invalid-input', extra: { field: 'noise' } });
  expect(refused({ fit: fitOf({ ...SHELL, vSys: 400 }) })).toMatchObject({ extra: { field: 'fitId' } });
  expect(refused({ fit: fitOf({ ...SHELL, vExp: NaN }) })).toMatchObject({ extra: { field: 'fitId' } });
  expect(() => traceChannel(planTrace(task), 16, new Float32Array(7))).toThrow(RangeError);
});

test('a traced rim becomes marks; one that hardly shows is refused with the reason', () => {
  const planeOf = (channel: number) =>
    planeWith(() => modelRadius(wcs.velocityOf(channel), wcs.velocityStep, SHELL)!);
  const outcome = traceRim(task, planeOf);
  expect(outcome.seen).toBeGreaterThan(0.9);
  expect(outcome.seenByChannel[0]).toMatchObject({ channel: outcome.sectors[0]!.channel });
  expect(outcome.faint).toBe(false);
  const input = tracedInput(outcome, wcs.velocityStep);
  expect(input.traced).toEqual({ beamDeg: BEAM, faint: false });
  expect(input.marks).toHaveLength(outcome.sectors.filter((s) => s.rejected === null).length);

  const nothing = traceRim(task, () => new Float32Array(SHAPE.nx * SHAPE.ny).fill(NaN));
  expect(nothing.seen).toBe(0);
  expect(() => tracedInput(nothing, 1)).toThrow(/0 of \d+ sectors, on 0 channels.*blank pixels/);
});
