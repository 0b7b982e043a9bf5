import {
  sectorAt,
  SECTORS,
  withErased,
  withMarks,
  withTheta,
  type RingDraft,
} from '@/shared/shell/suggest/ringDraft';
import type { LonLat } from '@/shared/sky/greatCircle';

const KEY_TURN = 360 / SECTORS;

/**
 * What a key does to the circle that is being drawn; null: it is none of its keys.
 *
 * @param degrees by which its radius changes
 * @param moved its centre a step to the right (+1) or up
 */
export function ringKey(
  draft: RingDraft,
  key: string,
  shift: boolean,
  degrees: number,
  moved: (right: number, up: number) => LonLat | null,
): RingDraft | 'confirm' | 'drop' | null {
  const to = (right: number, up: number) => ({ ...draft, centre: moved(right, up) ?? draft.centre });
  const turned = (by: number) => ({ ...draft, handle: (draft.handle + by + 360) % 360 });
  switch (key) {
    case 'ArrowUp':
      return shift ? withTheta(draft, draft.theta + degrees) : to(0, 1);
    case 'ArrowDown':
      return shift ? withTheta(draft, draft.theta - degrees) : to(0, -1);
    case 'ArrowLeft':
      return shift ? turned(KEY_TURN) : to(-1, 0);
    case 'ArrowRight':
      return shift ? turned(-KEY_TURN) : to(1, 0);
    case '[':
      return withMarks(draft, draft.marks - 1);
    case ']':
      return withMarks(draft, draft.marks + 1);
    case 'e':
    case 'E': {
      const erased = !draft.erased[sectorAt(draft.handle)];
      return withErased(draft, draft.handle, draft.handle, erased);
    }
    case 'Enter':
      return 'confirm';
    case 'Escape':
      return 'drop';
    default:
      return null;
  }
}
