import { z } from 'zod';
import { Id, Time, text } from './common';
import { ROLES } from './permissions';

export const RoleSchema = z.enum(ROLES);
export const Person = z.object({ id: Id, login: z.string(), name: z.string() }).meta({ id: 'Person' });

export const Me = z
  .object({
    id: Id,
    login: z.string(),
    name: z.string(),
    email: z.string().nullable(),
    team: z.object({ id: Id, name: z.string() }).nullable(),
    role: RoleSchema.nullable().describe('role in the team; null: not in a team yet'),
    csrfToken: z
      .string()
      .nullable()
      .describe('goes into the header X-CSRF-Token of every write; null with a token'),
  })
  .meta({ id: 'Me' });

export const Member = z.object({ person: Person, role: RoleSchema, since: Time }).meta({ id: 'Member' });
export const MemberChange = z.strictObject({ role: RoleSchema }).meta({ id: 'MemberChange' });
export const MemberDraft = z
  .strictObject({ login: text(80), role: RoleSchema })
  .meta({ id: 'MemberDraft', description: 'a login that has signed in once' });

export const TokenDraft = z.strictObject({ name: text(80) }).meta({ id: 'TokenDraft' });
export const Token = z
  .object({ id: Id, name: z.string(), createdAt: Time, lastUsedAt: Time.nullable() })
  .meta({ id: 'Token' });
export const NewToken = Token.extend({ secret: z.string().describe('shown once') }).meta({ id: 'NewToken' });

export type Person = z.infer<typeof Person>;
export type Me = z.infer<typeof Me>;
export type Member = z.infer<typeof Member>;
export type Token = z.infer<typeof Token>;
export type NewToken = z.infer<typeof NewToken>;
