import { rows, type Db } from './db';

export interface TokenRow {
  id: string;
  name: string;
  createdAt: Date;
  lastUsedAt: Date | null;
}
const columns =
  'tokens.id, tokens.name, tokens.created_at as "createdAt", tokens.last_used_at as "lastUsedAt"';

export const listTokens = (db: Db, personId: string) =>
  rows<TokenRow>(
    db,
    `select ${columns} from tokens where tokens.person_id = ? and tokens.revoked_at is null order by tokens.created_at desc`,
    [personId],
  );

export async function insertToken(
  db: Db,
  token: { id: string; personId: string; name: string; secretHash: string },
): Promise<TokenRow> {
  const found = await rows<TokenRow>(
    db,
    `insert into tokens (id, person_id, name, secret_hash) values (?, ?, ?, ?) returning ${columns}`,
    [token.id, token.personId, token.name, token.secretHash],
  );
  return found[0]!;
}

/** True when there was a token of this person to revoke. */
export async function revokeToken(db: Db, personId: string, id: string): Promise<boolean> {
  const found = await rows(
    db,
    `update tokens set revoked_at = now() where id = ? and person_id = ? and revoked_at is null returning id`,
    [id, personId],
  );
  return found.length > 0;
}

/** The person a secret belongs to; notes the use, at most once a minute. */
export async function useToken(db: Db, secretHash: string): Promise<string | undefined> {
  const found = await rows<{ personId: string; id: string; stale: boolean }>(
    db,
    `select tokens.id, tokens.person_id as "personId",
            coalesce(tokens.last_used_at < now() - interval '1 minute', true) as stale
     from tokens where tokens.secret_hash = ? and tokens.revoked_at is null`,
    [secretHash],
  );
  const token = found[0];
  if (token?.stale) await db.raw('update tokens set last_used_at = now() where id = ?', [token.id]);
  return token?.personId;
}
