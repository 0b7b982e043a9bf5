import { destination, positionAngle, separation, wrap360, type LonLat } from '@/shared/sky/greatCircle';

/** A circle on the sky that a person drew to make rim marks of. Galactic degrees; angles from north through east. */
export interface RingDraft {
  centre: LonLat;
  /** Angular radius, degrees. */
  theta: number;
  /** Direction of the handle that changes the radius, and of the first mark on a whole circle. */
  handle: number;
  /** How many marks it becomes. */
  marks: number;
  /** Sectors where no rim is seen, `SECTORS` of them from north through east. */
  erased: readonly boolean[];
}

export const SECTORS = 72;
const SECTOR = 360 / SECTORS;
export const MARKS = { least: 6, usual: 8, most: 16 } as const;

/** Too small to be meant: a circle must be wider than this, degrees. */
const LEAST_THETA = 1e-5;
const MOST_THETA = 80;

/**
 * A circle about a centre through a place on its rim.
 *
 * @param like keeps the number of marks and the erased parts of an earlier circle
 */
export function ringThrough(centre: LonLat, rim: LonLat, like?: RingDraft | null): RingDraft {
  return {
    centre,
    theta: held(separation(centre, rim)),
    handle: positionAngle(centre, rim),
    marks: like?.marks ?? MARKS.usual,
    erased: like?.erased ?? new Array<boolean>(SECTORS).fill(false),
  };
}

const held = (theta: number) => Math.min(Math.max(theta, LEAST_THETA), MOST_THETA);

export const withTheta = (draft: RingDraft, theta: number): RingDraft => ({ ...draft, theta: held(theta) });

export const withMarks = (draft: RingDraft, marks: number): RingDraft => ({
  ...draft,
  marks: Math.min(Math.max(Math.round(marks), MARKS.least), MARKS.most),
});

/**
 * How many times the usual position error each mark of the circle has, so that the circle weighs as much whatever number
 * of marks it becomes: as much as `MARKS.usual` marks around the whole of it, in proportion to what of it is seen. A
 * convention: nobody draws a circle better because it is cut into more pieces.
 */
export function sigmaFactor({ marks, erased }: RingDraft): number {
  const seen = erased.filter((e) => !e).length / SECTORS;
  return Math.sqrt(marks / (MARKS.usual * Math.max(seen, 1 / SECTORS)));
}

export const sectorAt = (angle: number): number => Math.floor(wrap360(angle) / SECTOR) % SECTORS;

/** Erase, or restore, the sectors from one direction to another, the shorter way round and both ends with it. */
export function withErased(draft: RingDraft, from: number, to: number, erased: boolean): RingDraft {
  const [a, b] = [sectorAt(from), sectorAt(to)];
  const ahead = (b - a + SECTORS) % SECTORS;
  const [first, steps] = ahead <= SECTORS / 2 ? [a, ahead] : [b, SECTORS - ahead];
  const next = [...draft.erased];
  for (let i = 0; i <= steps; i++) next[(first + i) % SECTORS] = erased;
  return next.some((e, i) => e !== draft.erased[i]) ? { ...draft, erased: next } : draft;
}

/** The parts that are seen, as directions from … to (to may pass 360); one part of a whole turn where nothing is erased. */
export function seenArcs({ erased, handle }: RingDraft): { from: number; to: number }[] {
  const gap = erased.indexOf(true);
  if (gap < 0) return [{ from: handle, to: handle + 360 }];
  const arcs: { from: number; to: number }[] = [];
  for (let i = 1; i <= SECTORS; i++) {
    const sector = gap + i;
    if (erased[sector % SECTORS]) continue;
    const last = arcs[arcs.length - 1];
    if (last && last.to === sector * SECTOR) last.to += SECTOR;
    else arcs.push({ from: sector * SECTOR, to: (sector + 1) * SECTOR });
  }
  return arcs;
}

/** Directions of the marks: evenly over what is seen, the first at the handle where all of it is. */
export function markAngles(draft: RingDraft): number[] {
  const arcs = seenArcs(draft);
  const length = arcs.reduce((sum, arc) => sum + arc.to - arc.from, 0);
  if (length <= 0) return [];
  const whole = !draft.erased.includes(true);
  const spacing = length / draft.marks;
  return Array.from({ length: draft.marks }, (_, i) => {
    let along = (i + (whole ? 0 : 0.5)) * spacing;
    for (const arc of arcs) {
      if (along < arc.to - arc.from) return wrap360(arc.from + along);
      along -= arc.to - arc.from;
    }
    return wrap360(arcs[arcs.length - 1]!.to);
  });
}

/** The marks' places on the sky; none where all of the circle is erased. */
export const ringPlaces = (draft: RingDraft): LonLat[] =>
  markAngles(draft).map((angle) => destination(draft.centre, angle, draft.theta));
