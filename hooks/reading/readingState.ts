import {
  described,
  placed,
  sameMark,
  sameMarks,
  union,
  type MarkSaid,
  type PlacedMark,
} from '@/hooks/reading/placedMark';
import { applied, difference, reversed, stacked, type Change, type Step } from '@/hooks/reading/readingSteps';
import type { ReadingHistory } from '@/hooks/reading/readingHistory';
import type { ProblemBody } from '@/shared/contract/problem';
import type { Reading } from '@/shared/contract/readings';

/** Marks that have not reached the server, kept in the browser. */
export interface ReadingDraftCopy {
  marks: readonly PlacedMark[];
  /** The revision they build on. */
  revision: number;
  /** Marks that were on their way to the server when this was kept: they may have arrived. */
  sent?: readonly PlacedMark[] | null;
}

/** A marking session: the marks as they stand, and how far the server knows of them. */
export interface ReadingState {
  ready: boolean;
  /** Whose shell these marks are of: they must never be saved under another. */
  shellId: string | null;
  readingId: string | null;
  /** The cube the stored marks lie on; null while there are none. */
  cubeId: string | null;
  marks: readonly PlacedMark[];
  revision: number;
  /** Counts the changes made here; the server has seen the first `savedEdits` of them. */
  edits: number;
  savedEdits: number;
  sending: { edits: number; marks: readonly PlacedMark[] } | null;
  /** Sent, and the answer was lost: the server may have them or not. */
  doubtful: readonly PlacedMark[] | null;
  offline: boolean;
  problem: ProblemBody | null;
  conflict: Reading | null;
  undo: readonly Step[];
  redo: readonly Step[];
}

export const EMPTY_READING: ReadingState = {
  ready: false,
  shellId: null,
  readingId: null,
  cubeId: null,
  marks: [],
  revision: 0,
  edits: 0,
  savedEdits: 0,
  sending: null,
  doubtful: null,
  offline: false,
  problem: null,
  conflict: null,
  undo: [],
  redo: [],
};

export type ReadingAction =
  | { type: 'loaded'; reading: Reading; draft: ReadingDraftCopy | null; history?: ReadingHistory | null }
  | { type: 'arrived'; reading: Reading }
  | { type: 'add'; marks: readonly PlacedMark[] }
  | { type: 'move'; to: readonly { id: string; x: number; y: number }[]; gesture: string | null }
  | { type: 'describe'; ids: readonly string[]; said: MarkSaid; gesture: string | null }
  | { type: 'remove'; ids: readonly string[] }
  | { type: 'undo' }
  | { type: 'redo' }
  | { type: 'sending' }
  | { type: 'sent'; reading: Reading }
  | { type: 'lost' }
  | { type: 'refused'; problem: ProblemBody }
  | { type: 'conflicted'; stored: Reading }
  | { type: 'retry' }
  | { type: 'resolve'; keep: 'mine' | 'stored' | 'both' };

export function readingReducer(state: ReadingState, action: ReadingAction): ReadingState {
  switch (action.type) {
    case 'loaded':
      return remembering(loaded(action.reading, action.draft), action.history ?? null);
    case 'arrived': {
      // News from another window: taken over only where nothing made here would be lost.
      const { reading } = action;
      if (!state.ready || reading.revision <= state.revision || isDirty(state) || state.conflict)
        return state;
      const marks = placed(reading.marks);
      // The steps of undo lead from what was here before to other marks than those that came.
      const steps = sameMarks(marks, state.marks) ? {} : { undo: [], redo: [] };
      return { ...state, ...known(reading), ...steps, marks };
    }
    case 'add': {
      const here = new Set(state.marks.map((mark) => mark.id));
      const changes = action.marks
        .filter((mark) => !here.has(mark.id))
        .map((mark, i) => ({ id: mark.id, before: null, after: mark, index: state.marks.length + i }));
      return changes.length > 0 ? stepped(state, changes) : state;
    }
    case 'move': {
      const to = new Map(action.to.map((place) => [place.id, place]));
      return changed(state, action.gesture, (mark) => {
        const place = to.get(mark.id);
        return place ? { ...mark, x: place.x, y: place.y } : mark;
      });
    }
    case 'describe': {
      const ids = new Set(action.ids);
      return changed(state, action.gesture, (mark) =>
        ids.has(mark.id) ? described(mark, action.said) : mark,
      );
    }
    case 'remove': {
      const gone = new Set(action.ids);
      const changes = state.marks.flatMap((before, index) =>
        gone.has(before.id) ? [{ id: before.id, before, after: null, index }] : [],
      );
      return changes.length > 0 ? stepped(state, changes) : state;
    }
    case 'undo': {
      const step = state.undo[state.undo.length - 1];
      if (!step) return state;
      const marks = applied(state.marks, reversed(step).changes);
      return {
        ...edited(state, marks),
        undo: state.undo.slice(0, -1),
        redo: [...state.redo, { ...step, gesture: null }],
      };
    }
    case 'redo': {
      const step = state.redo[state.redo.length - 1];
      if (!step) return state;
      return {
        ...edited(state, applied(state.marks, step.changes)),
        undo: [...state.undo, step],
        redo: state.redo.slice(0, -1),
      };
    }
    case 'sending':
      return { ...state, sending: { edits: state.edits, marks: state.marks } };
    case 'sent':
      return settled(state, action.reading);
    case 'lost':
      return { ...state, sending: null, doubtful: state.sending?.marks ?? state.doubtful, offline: true };
    case 'refused':
      return { ...state, sending: null, offline: false, problem: action.problem };
    case 'conflicted': {
      const stored = placed(action.stored.marks);
      const sent = [state.sending?.marks, state.doubtful].find((marks) => marks && sameMarks(marks, stored));
      // The newer version may be our own, whose answer was lost: then nobody else wrote anything.
      if (sent && state.sending?.marks === sent) return settled(state, action.stored);
      if (sent) return { ...state, ...known(action.stored), sending: null, doubtful: null, offline: false };
      return { ...state, sending: null, doubtful: null, offline: false, conflict: action.stored };
    }
    case 'retry':
      return { ...state, problem: null };
    case 'resolve':
      return resolved(state, action.keep);
  }
}

const known = (reading: Reading) => ({
  shellId: reading.shellId,
  readingId: reading.id,
  cubeId: reading.cubeId,
  revision: reading.revision,
});

function loaded(reading: Reading, draft: ReadingDraftCopy | null): ReadingState {
  const stored = placed(reading.marks);
  const fresh: ReadingState = { ...EMPTY_READING, ready: true, ...known(reading), marks: stored };
  if (!draft || sameMarks(draft.marks, stored)) return fresh;
  // The draft goes on from what is stored, or someone has saved since: then a person must choose.
  const drafted = { ...fresh, marks: draft.marks, edits: difference(stored, draft.marks).length };
  const arrived = draft.sent != null && sameMarks(draft.sent, stored);
  if (draft.revision === reading.revision || arrived) return drafted;
  return { ...drafted, revision: draft.revision, conflict: reading };
}

/** With the undo and redo of the last visit, where they lead to and from just these marks. */
const remembering = (state: ReadingState, history: ReadingHistory | null): ReadingState =>
  history && !state.conflict && sameMarks(history.marks, state.marks)
    ? { ...state, undo: history.undo, redo: history.redo }
    : state;

function edited(state: ReadingState, marks: readonly PlacedMark[]): ReadingState {
  return { ...state, marks, edits: state.edits + 1, problem: null };
}

function stepped(
  state: ReadingState,
  changes: readonly Change[],
  gesture: string | null = null,
): ReadingState {
  const undo = stacked(state.undo, { changes, gesture });
  return { ...edited(state, applied(state.marks, changes)), undo, redo: [] };
}

/** The same marks, some of them otherwise than before, as one step. */
function changed(
  state: ReadingState,
  gesture: string | null,
  change: (mark: PlacedMark) => PlacedMark,
): ReadingState {
  const changes = state.marks.flatMap((before, index) => {
    const after = change(before);
    return sameMark(before, after) ? [] : [{ id: before.id, before, after, index }];
  });
  return changes.length > 0 ? stepped(state, changes, gesture) : state;
}

function settled(state: ReadingState, reading: Reading): ReadingState {
  const savedEdits = state.sending?.edits ?? state.savedEdits;
  return { ...state, ...known(reading), savedEdits, sending: null, doubtful: null, offline: false };
}

function resolved(state: ReadingState, keep: 'mine' | 'stored' | 'both'): ReadingState {
  const { conflict } = state;
  if (!conflict) return state;
  const stored = placed(conflict.marks);
  const marks = { mine: state.marks, stored, both: union(state.marks, stored) }[keep];
  const changes = difference(state.marks, marks);
  const base = { ...state, ...known(conflict), conflict: null };
  const after = changes.length > 0 ? stepped(base, changes) : base;
  // A conflict only comes up over unsaved changes, so anything but the stored marks is still to be saved.
  return sameMarks(marks, stored) ? { ...after, marks, savedEdits: after.edits } : after;
}

/** What the browser keeps until the server has it. */
export const draftOf = (state: ReadingState): ReadingDraftCopy => ({
  marks: state.marks,
  revision: state.revision,
  sent: state.sending?.marks ?? state.doubtful,
});

/** Whether something made here has not reached the server. */
export const isDirty = (state: ReadingState): boolean => state.edits !== state.savedEdits;

/** Whether the writer should send now: one request at a time, and none while a person has to decide. */
export const shouldSend = (state: ReadingState): boolean =>
  state.ready && isDirty(state) && !state.sending && !state.conflict && !state.problem;

export type SaveStatus =
  | { kind: 'loading' | 'saved' | 'saving' | 'conflict' }
  | { kind: 'offline'; waiting: number }
  | { kind: 'refused'; problem: ProblemBody };

export function saveStatus(state: ReadingState): SaveStatus {
  if (!state.ready) return { kind: 'loading' };
  if (state.conflict) return { kind: 'conflict' };
  if (state.problem) return { kind: 'refused', problem: state.problem };
  if (!isDirty(state)) return { kind: 'saved' };
  return state.offline ? { kind: 'offline', waiting: state.edits - state.savedEdits } : { kind: 'saving' };
}
