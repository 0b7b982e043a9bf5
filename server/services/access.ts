import { may, PERMISSIONS, type Action } from '@/shared/contract/permissions';
import { Problem } from '@/shared/contract/problem';
import type { Actor } from './context';

/** The team the person works in, or a problem that says whom to ask. */
export function requireTeam(actor: Actor): string {
  if (!actor.team)
    throw new Problem(
      'not-allowed',
      `You are signed in as ${actor.login} but are in no team yet. Ask a lead to take you in by that login.`,
    );
  return actor.team.id;
}

/**
 * The one question of access: may this person do this to a record of that team? A record of another team is
 * answered as if it were not there, so that nobody learns what exists elsewhere.
 */
export function requirePermission(actor: Actor, action: Action, teamId: string, what = 'record'): void {
  if (requireTeam(actor) !== teamId) throw notFound(what);
  if (!may(actor.role, action))
    throw new Problem(
      'not-allowed',
      `A ${actor.role} may not do this; it takes the role ${PERMISSIONS[action].join(' or ')}. Ask a lead of ${actor.team!.name}.`,
    );
}

export const notFound = (what: string) =>
  new Problem('not-found', `There is no such ${what}, or it is not your team's.`);
