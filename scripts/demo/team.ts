import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { Me, Member } from '@/shared/contract/people';
import type { Role } from '@/shared/contract/permissions';
import { signIn, type Client } from './client';

interface DemoPerson {
  login: string;
  name: string;
  role: Role;
}

/** The demo people, signed in. The first becomes lead of a new team by being first, and takes the others in. */
export async function gatherTeam(base: string): Promise<Map<string, Client>> {
  const file = join(__dirname, '..', '..', 'server', 'fakes', 'demoPeople.json');
  const people = JSON.parse(await readFile(file, 'utf8')) as DemoPerson[];
  const clients = new Map<string, Client>();
  for (const { login } of people) clients.set(login, await signIn(base, login));
  const [lead, ...others] = people as [DemoPerson, ...DemoPerson[]];
  const first = clients.get(lead.login)!;
  const me = await first.get<Me>('/me');
  if (me.role !== 'lead')
    throw new Error(
      `${lead.name} is ${me.role ?? 'in no team'} here, not lead: the demo needs an installation of its own`,
    );
  const members = await first.list<Member>('/members');
  for (const { login, role } of others)
    if (!members.some((m) => m.person.login === login)) await first.send('POST', '/members', { login, role });
  return clients;
}
