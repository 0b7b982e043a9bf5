import knexFactory, { type Knex } from 'knex';

/** A connection pool or a transaction: store functions take either. */
export type Db = Knex | Knex.Transaction;

/** Opens the pool. Whoever opens it ends it with `db.destroy()`. */
export const openDatabase = (url: string, max = 10): Knex =>
  knexFactory({ client: 'pg', connection: url, pool: { min: 0, max } });

/** The rows of a raw query. */
export const rows = async <Row>(db: Db, sql: string, bindings: Knex.RawBinding[] = []): Promise<Row[]> =>
  (await db.raw(sql, bindings)).rows as Row[];

export const isoTime = (date: Date): string => date.toISOString();
export const isoTimeOrNull = (date: Date | null): string | null => date?.toISOString() ?? null;

/** PostgreSQL's code of a unique violation, so that a service can say what is already there. */
export const isUniqueViolation = (error: unknown, constraint?: string): boolean => {
  const e = error as { code?: string; constraint?: string };
  return e?.code === '23505' && (constraint === undefined || e.constraint === constraint);
};
