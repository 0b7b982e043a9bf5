import { randomUUID } from 'node:crypto';
import type { Role } from '@/shared/contract/permissions';
import { appendEvent } from '../store/events';
import {
  countTeams,
  findMembership,
  findPerson,
  insertTeam,
  lockTeams,
  upsertMembership,
  upsertPerson,
} from '../store/people';
import type { Db } from '../store/db';
import type { Actor, Parts } from './context';

export interface ProviderProfile {
  providerId: string;
  login: string;
  name: string | null;
  /** Only an address the provider has verified. */
  email: string | null;
}

/** A person came back from the provider. The first person of an empty installation leads a new team. */
export async function signIn(parts: Parts, profile: ProviderProfile): Promise<Actor> {
  const id = await parts.db.transaction(async (trx) => {
    const person = await upsertPerson(trx, {
      id: randomUUID(),
      providerId: profile.providerId,
      login: profile.login,
      name: profile.name?.trim() || profile.login,
      email: profile.email,
    });
    if (!(await findMembership(trx, person.id))) {
      await lockTeams(trx);
      if ((await countTeams(trx)) === 0) {
        const teamId = randomUUID();
        await insertTeam(trx, { id: teamId, name: `Team of ${person.name}` });
        await join(trx, teamId, person.id, 'lead', person.id);
      }
    }
    return person.id;
  });
  return (await loadActor(parts, id))!;
}

async function join(db: Db, teamId: string, personId: string, role: Role, by: string) {
  await upsertMembership(db, { teamId, personId, role });
  await appendEvent(db, { teamId, personId: by, kind: 'member.joined', subjectId: personId, data: { role } });
}

/** The person as every request sees them, with the role of this moment. */
export async function loadActor(parts: Pick<Parts, 'db'>, personId: string): Promise<Actor | undefined> {
  const person = await findPerson(parts.db, personId);
  if (!person) return undefined;
  const membership = await findMembership(parts.db, personId);
  return {
    id: person.id,
    login: person.login,
    name: person.name,
    email: person.email,
    team: membership ? { id: membership.teamId, name: membership.teamName } : null,
    role: membership?.role ?? null,
  };
}
