import { rows, type Db } from './db';

export interface EventDraft {
  teamId: string;
  personId: string | null;
  kind: string;
  subjectId: string;
  data?: Record<string, unknown>;
}

/** Who did what to which record: written in the transaction that does it, never changed. */
export const appendEvent = (db: Db, event: EventDraft) =>
  db('events').insert({
    team_id: event.teamId,
    person_id: event.personId,
    kind: event.kind,
    subject_id: event.subjectId,
    data: JSON.stringify(event.data ?? {}),
  });

/** The channel that every server process listens on. Sent when the transaction commits. */
export const LIVE_CHANNEL = 'outswell_live';
export const notifyLive = (db: Db, payload: Record<string, unknown>) =>
  rows(db, 'select pg_notify(?, ?)', [LIVE_CHANNEL, JSON.stringify(payload)]);
