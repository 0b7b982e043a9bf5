import { createHash, randomBytes, randomUUID } from 'node:crypto';
import type { NewToken, Token } from '@/shared/contract/people';
import { isoTime, isoTimeOrNull } from '../store/db';
import { insertToken, listTokens, revokeToken, useToken, type TokenRow } from '../store/tokens';
import { notFound } from './access';
import type { Context, Parts } from './context';

const toToken = (row: TokenRow): Token => ({
  id: row.id,
  name: row.name,
  createdAt: isoTime(row.createdAt),
  lastUsedAt: isoTimeOrNull(row.lastUsedAt),
});

// 32 random bytes need no slow hash: there is nothing to guess
const hash = (secret: string) => createHash('sha256').update(secret).digest('hex');

export const myTokens = async (ctx: Context): Promise<Token[]> =>
  (await listTokens(ctx.db, ctx.actor.id)).map(toToken);

/** Make a token. Its secret is in this answer and nowhere else. */
export async function makeToken(ctx: Context, name: string): Promise<NewToken> {
  const secret = `osw_${randomBytes(32).toString('base64url')}`;
  const row = await insertToken(ctx.db, {
    id: randomUUID(),
    personId: ctx.actor.id,
    name,
    secretHash: hash(secret),
  });
  return { ...toToken(row), secret };
}

export async function revokeMyToken(ctx: Context, id: string): Promise<void> {
  if (!(await revokeToken(ctx.db, ctx.actor.id, id))) throw notFound('token');
}

export const personOfToken = (parts: Pick<Parts, 'db'>, secret: string) => useToken(parts.db, hash(secret));
