import connectPgSimple from 'connect-pg-simple';
import session from 'express-session';
import type { RequestHandler } from 'express';
import { Pool } from 'pg';
import type { Config } from '../config';

const DAY_MS = 86_400_000;

/** Sessions in PostgreSQL: they outlive a restart, and signing out ends them at once. */
export function sessions(config: Config): { handler: RequestHandler; close: () => Promise<void> } {
  const pool = new Pool({ connectionString: config.databaseUrl, max: 3 });
  pool.on('error', () => undefined); // the next query opens another connection
  const Store = connectPgSimple(session);
  const store = new Store({
    pool,
    tableName: 'sessions',
    pruneSessionInterval: config.env === 'test' ? false : 3600,
  });
  const handler = session({
    name: 'outswell',
    secret: config.sessionSecret,
    store,
    resave: false,
    saveUninitialized: false,
    rolling: true,
    cookie: { httpOnly: true, sameSite: 'lax', secure: 'auto', maxAge: 14 * DAY_MS },
  });
  return {
    handler,
    close: async () => {
      store.close();
      await pool.end();
    },
  };
}
