import type { Role } from '@/shared/contract/permissions';
import { rows, type Db } from './db';

export interface PersonRow {
  id: string;
  login: string;
  name: string;
  email: string | null;
}
export interface MembershipRow {
  personId: string;
  teamId: string;
  teamName: string;
  role: Role;
}

/** Insert the person, or bring login, name and address up to date with what the provider says now. */
export async function upsertPerson(
  db: Db,
  person: { id: string; providerId: string; login: string; name: string; email: string | null },
): Promise<PersonRow> {
  // a login freed at the provider and taken by somebody else must not lock that person out
  await db.raw(
    `update people set login = people.login || '~' || left(people.id::text, 8)
     where people.login = ? and people.provider_id <> ?`,
    [person.login, person.providerId],
  );
  const [row] = await rows<PersonRow>(
    db,
    `insert into people (id, provider_id, login, name, email) values (?, ?, ?, ?, ?)
     on conflict (provider_id) do update set login = excluded.login, name = excluded.name, email = excluded.email
     returning id, login, name, email`,
    [person.id, person.providerId, person.login, person.name, person.email],
  );
  return row!;
}

export async function findPerson(db: Db, id: string): Promise<PersonRow | undefined> {
  return (await rows<PersonRow>(db, 'select id, login, name, email from people where id = ?', [id]))[0];
}

export async function findPersonByLogin(db: Db, login: string): Promise<PersonRow | undefined> {
  return (await rows<PersonRow>(db, 'select id, login, name, email from people where login = ?', [login]))[0];
}

export async function findMembership(db: Db, personId: string): Promise<MembershipRow | undefined> {
  const found = await rows<MembershipRow>(
    db,
    `select memberships.person_id as "personId", memberships.team_id as "teamId", teams.name as "teamName",
            memberships.role
     from memberships join teams on teams.id = memberships.team_id
     where memberships.person_id = ?`,
    [personId],
  );
  return found[0];
}

/** Serialises the question "is this the first person?" over all server processes. */
export const lockTeams = (db: Db) => db.raw('lock table teams in share row exclusive mode');

export async function countTeams(db: Db): Promise<number> {
  return Number((await rows<{ n: string }>(db, 'select count(*) as n from teams'))[0]!.n);
}

export const insertTeam = (db: Db, team: { id: string; name: string }) =>
  db.raw('insert into teams (id, name) values (?, ?)', [team.id, team.name]);

export const upsertMembership = (db: Db, m: { teamId: string; personId: string; role: Role }) =>
  db.raw(
    `insert into memberships (team_id, person_id, role) values (?, ?, ?)
     on conflict (team_id, person_id) do update set role = excluded.role`,
    [m.teamId, m.personId, m.role],
  );

export const deleteMembership = (db: Db, teamId: string, personId: string) =>
  db.raw('delete from memberships where team_id = ? and person_id = ?', [teamId, personId]);

export interface MemberRow extends PersonRow {
  role: Role;
  since: Date;
}
export const listMembers = (db: Db, teamId: string) =>
  rows<MemberRow>(
    db,
    `select people.id, people.login, people.name, people.email, memberships.role, memberships.created_at as since
     from memberships join people on people.id = memberships.person_id
     where memberships.team_id = ? order by memberships.created_at, people.login`,
    [teamId],
  );
