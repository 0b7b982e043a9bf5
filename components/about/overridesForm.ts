import type { CubeOverrides } from '@/shared/contract/cubes';

/** The form as it is typed; empty text: as the file says. Arc minutes and MHz for people, degrees and Hz between us. */
export interface OverrideFields {
  unit: string;
  restMHz: string;
  major: string;
  minor: string;
  angle: string;
  convention: string;
  velocityFrame: string;
}
export type OverrideProblems = Partial<Record<keyof OverrideFields, string>>;

export const UNITS = ['K', 'mK', 'Jy/beam', 'mJy/beam'] as const;
export const CONVENTIONS = ['radio', 'optical', 'relativistic'] as const;
export const REST_FRAMES = [
  'LSRK',
  'LSRD',
  'BARYCENT',
  'HELIOCEN',
  'TOPOCENT',
  'GEOCENTR',
  'GALACTOC',
  'LOCALGRP',
] as const;

const tidy = (value: number): string => String(Number(value.toPrecision(10)));

export function fieldsOf(values: CubeOverrides | null): OverrideFields {
  const { unit, restFrequencyHz, beam, convention, velocityFrame } = values ?? {};
  return {
    unit: unit ?? '',
    restMHz: restFrequencyHz ? tidy(restFrequencyHz / 1e6) : '',
    major: beam ? tidy(beam.major * 60) : '',
    minor: beam ? tidy(beam.minor * 60) : '',
    angle: beam ? tidy(beam.angle) : '',
    convention: convention ?? '',
    velocityFrame: velocityFrame ?? '',
  };
}

const numberOf = (text: string): number => Number(text.trim().replace('−', '-').replace(',', '.'));

/** What a form asks to be changed: only what differs, null for what is taken back; or what is wrong where. */
export function readOverrides(
  fields: OverrideFields,
  before: CubeOverrides | null,
): { change: CubeOverrides } | { problems: OverrideProblems } {
  const problems: OverrideProblems = {};
  const positive = (name: 'restMHz' | 'major' | 'minor', what: string): number => {
    const value = numberOf(fields[name]);
    if (fields[name].trim() === '' || !(value > 0) || !Number.isFinite(value)) problems[name] = what;
    return value;
  };
  const asked: CubeOverrides = {
    unit: (UNITS.find((u) => u === fields.unit) ?? null) as CubeOverrides['unit'],
    convention: CONVENTIONS.find((c) => c === fields.convention) ?? null,
    velocityFrame: REST_FRAMES.find((f) => f === fields.velocityFrame) ?? null,
    restFrequencyHz: null,
    beam: null,
  };
  if (fields.restMHz.trim() !== '') {
    const mhz = positive('restMHz', 'A frequency in MHz, such as 1420.405752.');
    if (mhz > 1e7) problems.restMHz = 'That is more than 10 THz. The number is in MHz.';
    asked.restFrequencyHz = Number((mhz * 1e6).toPrecision(15));
  }
  if ([fields.major, fields.minor, fields.angle].some((text) => text.trim() !== '')) {
    const major = positive('major', 'The longer width in minutes of arc.');
    const minor =
      fields.minor.trim() === '' ? major : positive('minor', 'The shorter width in minutes of arc.');
    const angle = fields.angle.trim() === '' ? 0 : numberOf(fields.angle);
    if (!Number.isFinite(angle)) problems.angle = 'Degrees from north through east.';
    if (minor > major) problems.minor = 'The shorter width cannot exceed the longer one.';
    if (major > 90 * 60) problems.major = 'At most 5400 minutes of arc.';
    const degrees = (minutes: number) => Number((minutes / 60).toPrecision(12));
    asked.beam = { major: degrees(major), minor: degrees(minor), angle };
  }
  if (Object.keys(problems).length > 0) return { problems };
  return { change: difference(asked, before) };
}

function difference(asked: CubeOverrides, before: CubeOverrides | null): CubeOverrides {
  const kept = fieldsOf(before);
  const now = fieldsOf(asked);
  const same = (...names: (keyof OverrideFields)[]) => names.every((name) => now[name] === kept[name]);
  return {
    ...(!same('unit') && { unit: asked.unit }),
    ...(!same('restMHz') && { restFrequencyHz: asked.restFrequencyHz }),
    ...(!same('major', 'minor', 'angle') && { beam: asked.beam }),
    ...(!same('convention') && { convention: asked.convention }),
    ...(!same('velocityFrame') && { velocityFrame: asked.velocityFrame }),
  };
}

/** Which field a refusal of the server names. */
export function placeProblem(field: string | undefined, detail: string): OverrideProblems | null {
  const names: Record<string, keyof OverrideFields> = {
    unit: 'unit',
    restFrequencyHz: 'restMHz',
    beam: 'major',
    'beam.major': 'major',
    'beam.minor': 'minor',
    'beam.angle': 'angle',
    convention: 'convention',
    velocityFrame: 'velocityFrame',
  };
  const name = field && names[field];
  return name ? { [name]: detail } : null;
}
