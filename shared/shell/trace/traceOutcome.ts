import { Problem } from '@/shared/contract/problem';
import type { TracedSector, TraceOutcome } from '@/shared/contract/traces';
import { LEAST_CHANNELS, type FitInput } from '@/shared/shell/fitInput';
import { median } from '@/shared/shell/robust';
import type { SectorTrace } from '@/shared/shell/trace/traceChannel';
import type { TracePlan } from '@/shared/shell/trace/tracePlan';

/** Fewer places than this are no rim. */
const LEAST_FOUND = 20;
/**
 * A rim is faint where the ridge of its median sector is less than this many times as high as the profile scatters away
 * from it. Cubes with rims a third as bright as the standard one of README.md have 6 to 7.7, the standard one 9 to 10.5;
 * very thick rims (10 %, 6.5 to 7) and gas of 4 km/s (about 8) scatter as much and fall under it, too.
 */
const FAINT = 8;

/** What was found on all channels of a plan: sectors by channel and azimuth, and how much of the rim is seen. */
export function traceOutcome(plan: TracePlan, sectors: readonly SectorTrace[]): TraceOutcome {
  const contrasts = sectors.flatMap((s) => (s.contrast === null ? [] : [s.contrast]));
  return {
    sectors: sectors.map(({ contrast: _, ...sector }) => sector),
    seen: shareSeen(sectors),
    seenByChannel: plan.channels.map((channel) => ({
      channel,
      velocity: plan.wcs.velocityOf(channel),
      seen: shareSeen(sectors.filter((s) => s.channel === channel)),
    })),
    noise: plan.noise,
    beamDeg: plan.beamDeg,
    faint: contrasts.length > 0 && median(contrasts) < FAINT,
    ...(plan.beamAssumed ? { beamAssumed: true } : {}),
  };
}

const shareSeen = (sectors: readonly TracedSector[]): number =>
  sectors.length === 0 ? 0 : sectors.filter((s) => s.rejected === null).length / sectors.length;

/**
 * The rim that was found, as the marks of a fit.
 *
 * @param channelWidth of the cube, km/s
 * @throws Problem marks-insufficient where there are under 20 places, or fewer than 3 channels with any
 */
export function tracedInput(outcome: TraceOutcome, channelWidth: number): FitInput {
  const { sectors, beamDeg, faint } = outcome;
  const found = sectors.filter((s) => s.rejected === null);
  const channels = new Set(found.map((s) => s.channel)).size;
  if (found.length < LEAST_FOUND || channels < LEAST_CHANNELS)
    throw new Problem(
      'marks-insufficient',
      `The rim shows in ${found.length} of ${sectors.length} sectors, on ${channels} channels; a fit needs ${LEAST_FOUND} ` +
        `on ${LEAST_CHANNELS} channels. ${whyNot(sectors)}`,
      { field: 'fitId' },
    );
  return {
    marks: found.map(({ l, b, velocity, sigma }) => ({ l: l!, b: b!, velocity, sigma: sigma! })),
    channelWidth,
    traced: { beamDeg, faint },
  };
}

/** The commonest reason of rejection, and what it means for the person. */
function whyNot(sectors: readonly TracedSector[]): string {
  const count = (reason: TracedSector['rejected']) => sectors.filter((s) => s.rejected === reason).length;
  const reasons = (['outside', 'blank', 'faint', 'at-end'] as const).map((reason) => ({
    reason,
    count: count(reason),
  }));
  const { reason } = reasons.reduce((a, b) => (b.count > a.count ? b : a));
  return {
    outside: 'Most of the others lie off the map: a cube that holds the whole shell would show them.',
    blank: 'Most of the others meet blank pixels.',
    faint: 'In most of the others nothing stands out of the noise.',
    'at-end':
      'In most of the others the brightest place lies far from where the fit expects the rim: check the fit.',
  }[reason];
}
