import { seededRandom } from '@/shared/random';
import { fitShell } from '@/shared/shell/fit';
import type { SkyMark } from '@/shared/shell/fitInput';
import { MARKS, ringPlaces, sigmaFactor, withMarks, type RingDraft } from '@/shared/shell/suggest/ringDraft';

const SIGMA = 0.075;
const TRUTH = { theta: 1, vSys: -40, vExp: 10 };

/** Circles drawn on six channels, each with an error of its own in centre and radius, cut into marks. */
function drawn(seed: number, marks: number, said: Pick<SkyMark, 'drawn'>): SkyMark[] {
  const random = seededRandom(seed);
  return [-47, -44, -41, -38, -35, -33].flatMap((velocity) => {
    const u = (velocity - TRUTH.vSys) / TRUTH.vExp;
    const circle: RingDraft = {
      centre: {
        lon: 120 + (random.normal() * SIGMA) / Math.sqrt(MARKS.usual / 2),
        lat: (random.normal() * SIGMA) / Math.sqrt(MARKS.usual / 2),
      },
      theta: TRUTH.theta * Math.sqrt(1 - u * u) + (random.normal() * SIGMA) / Math.sqrt(MARKS.usual),
      handle: 0,
      marks: MARKS.usual,
      erased: new Array<boolean>(72).fill(false),
    };
    const draft = withMarks(circle, marks);
    const sigma = SIGMA * sigmaFactor(draft);
    return ringPlaces(draft).map(({ lon, lat }) => ({ l: lon, b: lat, velocity, sigma, ...said }));
  });
}

const TRIES = 60;
/** Root mean square of errors in standard errors, and the median standard error, by parameter. */
function judged(marks: number, said: Pick<SkyMark, 'drawn'>) {
  const names = Object.keys(TRUTH) as (keyof typeof TRUTH)[];
  const fits = Array.from({ length: TRIES }, (_, i) =>
    fitShell({ marks: drawn(i + 1, marks, said), channelWidth: 1 }),
  );
  return names.map((name) => {
    const off = fits.map(({ parameters: { [name]: p } }) => (p!.value - TRUTH[name]) / p!.se!);
    const se = fits.map((fit) => fit.parameters[name]!.se!).sort((a, b) => a - b);
    return { rms: Math.sqrt(off.reduce((sum, z) => sum + z * z, 0) / TRIES), se: se[TRIES >> 1]! };
  });
}

test('error bars of drawn circles hold the truth, and are the same for any number of marks', () => {
  const eight = judged(8, { drawn: true });
  const sixteen = judged(16, { drawn: true });
  eight.forEach(({ rms, se }, i) => {
    expect(rms).toBeGreaterThan(0.55); // on the safe side, as the stated error and the scatter of rings both count
    expect(rms).toBeLessThan(1.1);
    expect(Math.abs(Math.log(sixteen[i]!.se / se))).toBeLessThan(0.03);
  });
  // taken for single marks, circles that cannot scatter would claim too much
  expect(judged(8, {})[0]!.rms).toBeGreaterThan(1.4);
});

test('circles about one and the same point do not make the centre exact, and it is said why', () => {
  const marks = [-46, -43, -40, -37, -34].flatMap((velocity) => {
    const theta = Math.sqrt(1 - ((velocity + 40) / 10) ** 2);
    const circle = { centre: { lon: 120, lat: 0 }, theta, handle: 0, marks: 8 };
    const places = ringPlaces({ ...circle, erased: new Array<boolean>(72).fill(false) });
    return places.map(({ lon, lat }) => ({ l: lon, b: lat, velocity, sigma: SIGMA, drawn: true }));
  });
  const fit = fitShell({ marks, channelWidth: 1 });
  expect(fit.extra.scales.mark).toBe(1);
  expect(fit.parameters.l!.se).toBeGreaterThan(SIGMA / Math.sqrt(marks.length));
  expect(fit.warnings.map((w) => w.code)).toContain('drawn-circles');
  const bare = fitShell({ marks: marks.map(({ sigma: _, ...mark }) => mark), channelWidth: 1 });
  expect(bare.parameters.l!.se).toBeGreaterThan(1e-3); // without a stated error too
});
