import { velocityLabel } from '@/shared/image/velocityDigits';
import { angleWords } from '@/components/seeing/seeing';

export interface CaptionFacts {
  cube: string;
  region: string | null;
  /** What is shown: null for a map of all channels, which `map` names. */
  channels: { first: number; last: number; count: number; velocities: readonly [number, number] } | null;
  map: string | null;
  channelWidth: number;
  velocityFrame: string | null;
  palette: string;
  tone: string;
  window: string;
  /** What was done to the picture. */
  stated: readonly string[];
  shell: string | null;
  marks: number;
  unsure: boolean;
  ownRing: boolean;
  /** What the layers show. */
  traced: boolean;
  frozenBy: string | null;
  otherShells: boolean;
  model: { source: 'trial' | 'live' | 'record'; theta: number; vSys: number; vExp: number } | null;
  beam: { major: number; minor: number } | null;
}

const SOURCES = {
  trial: 'trial model',
  live: 'sphere fitted to the marks',
  record: 'fit of record',
} as const;
const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** The caption that a figure begins with: everything that who sees it needs to know, in plain sentences. */
export function captionWords(f: CaptionFacts): string {
  const v = (value: number) => velocityLabel(value, f.channelWidth);
  const frame = f.velocityFrame ? ` (${f.velocityFrame})` : '';
  const sentences = [`${f.cube}${f.region ? `, ${f.region}` : ''}.`];
  if (f.map) sentences.push(`${f.map} of all channels.`);
  else if (f.channels && f.channels.count === 1)
    sentences.push(
      `Channel ${f.channels.first + 1} at ${v(f.channels.velocities[0])} km/s${frame}, ${f.channelWidth.toPrecision(3)} km/s wide.`,
    );
  else if (f.channels)
    sentences.push(
      `${f.channels.count} channels from ${v(f.channels.velocities[0])} to ${v(f.channels.velocities[1])} km/s${frame}, each ${f.channelWidth.toPrecision(3)} km/s wide.`,
    );
  if (f.stated.length > 0) sentences.push(`${capital(f.stated.join('; '))}.`);
  sentences.push(`Palette ${f.palette}, tone ${f.tone}, window ${f.window}.`);
  const on = f.shell ? ` of ${f.shell}` : '';
  if (f.marks > 0)
    sentences.push(`Dots: rim marks${on}${f.unsure ? ', hollow where the person was unsure' : ''}.`);
  if (f.ownRing) sentences.push('Dashed: circle through the marks of the channel.');
  if (f.model)
    sentences.push(
      `Ring: ${SOURCES[f.model.source]}, Θ = ${f.model.theta.toPrecision(3)}°, v_sys = ${v(f.model.vSys)} km/s, v_exp = ${v(f.model.vExp)} km/s.`,
    );
  if (f.traced)
    sentences.push('Lozenges: rim traced in the brightness; small crosses: looked for there, not found.');
  if (f.frozenBy) sentences.push(`Squares: marks of ${f.frozenBy}.`);
  if (f.otherShells) sentences.push('Dotted: rings of other adopted shells.');
  if (f.beam)
    sentences.push(`Beam ${angleWords(60 * f.beam.major)} × ${angleWords(60 * f.beam.minor)}, lower right.`);
  return sentences.join(' ');
}
