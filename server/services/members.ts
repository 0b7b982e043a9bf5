import type { Member } from '@/shared/contract/people';
import type { Role } from '@/shared/contract/permissions';
import { Problem } from '@/shared/contract/problem';
import { isoTime, type Db } from '../store/db';
import { appendEvent } from '../store/events';
import {
  deleteMembership,
  findMembership,
  findPersonByLogin,
  listMembers,
  lockTeams,
  upsertMembership,
  type MemberRow,
} from '../store/people';
import { notFound, requirePermission, requireTeam } from './access';
import type { Context } from './context';

const toMember = (row: MemberRow): Member => ({
  person: { id: row.id, login: row.login, name: row.name },
  role: row.role,
  since: isoTime(row.since),
});

export async function membersOfTeam(ctx: Context): Promise<Member[]> {
  return (await listMembers(ctx.db, requireTeam(ctx.actor))).map(toMember);
}

export async function addMember(ctx: Context, draft: { login: string; role: Role }): Promise<Member> {
  const teamId = requireTeam(ctx.actor);
  requirePermission(ctx.actor, 'team.manage', teamId);
  const person = await findPersonByLogin(ctx.db, draft.login);
  if (!person)
    throw new Problem(
      'invalid-input',
      `Nobody has signed in as ${draft.login} yet. Ask them to sign in once.`,
      {
        field: 'login',
      },
    );
  await ctx.db.transaction(async (trx) => {
    await lockTeams(trx);
    if (await findMembership(trx, person.id))
      throw new Problem('conflict', `${person.name} is in a team already.`, { field: 'login' });
    await upsertMembership(trx, { teamId, personId: person.id, role: draft.role });
    await note(trx, ctx, 'member.joined', person.id, { role: draft.role });
  });
  return memberOf(ctx, person.id);
}

export async function changeMember(ctx: Context, personId: string, role: Role): Promise<Member> {
  const teamId = requireTeam(ctx.actor);
  requirePermission(ctx.actor, 'team.manage', teamId);
  const before = await memberOf(ctx, personId);
  await ctx.db.transaction(async (trx) => {
    await lockTeams(trx);
    if (before.role === 'lead' && role !== 'lead') await refuseLastLead(trx, teamId);
    await upsertMembership(trx, { teamId, personId, role });
    await note(trx, ctx, 'member.changed', personId, { from: before.role, to: role });
  });
  return memberOf(ctx, personId);
}

export async function removeMember(ctx: Context, personId: string): Promise<void> {
  const teamId = requireTeam(ctx.actor);
  requirePermission(ctx.actor, 'team.manage', teamId);
  const member = await memberOf(ctx, personId);
  await ctx.db.transaction(async (trx) => {
    await lockTeams(trx);
    if (member.role === 'lead') await refuseLastLead(trx, teamId);
    await deleteMembership(trx, teamId, personId);
    await note(trx, ctx, 'member.left', personId, { role: member.role });
  });
}

async function memberOf(ctx: Context, personId: string): Promise<Member> {
  const member = (await membersOfTeam(ctx)).find((m) => m.person.id === personId);
  if (!member) throw notFound('member');
  return member;
}

/** A team without a lead could never change again. */
async function refuseLastLead(trx: Db, teamId: string) {
  const leads = (await listMembers(trx, teamId)).filter((m) => m.role === 'lead');
  if (leads.length === 1)
    throw new Problem('conflict', 'This is the only lead of the team. Make somebody else lead first.', {
      field: 'role',
    });
}

const note = (db: Db, ctx: Context, kind: string, subjectId: string, data: Record<string, unknown>) =>
  appendEvent(db, { teamId: ctx.actor.team!.id, personId: ctx.actor.id, kind, subjectId, data });
