import type { LiveEvent } from '@/shared/contract/events';
import type { Db } from '../store/db';
import { notifyLive } from '../store/events';

/** Tell every open page of the team that something changed; sent when the transaction commits. */
export const announce = (db: Db, teamId: string, event: LiveEvent) => notifyLive(db, { teamId, event });
