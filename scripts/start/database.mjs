// @ts-check
import { createRequire } from 'node:module';
import { join } from 'node:path';
import { Stop } from '../machine/stop.mjs';

/** Packages exist only by the time this is called, so they are not imported at the top. @param {string} root */
const packages = (root) => createRequire(join(root, 'package.json'));

/**
 * The address of our own database in a private cluster, made when it is not there.
 * @param {string} root @param {string} clusterUrl
 */
export async function ownDatabase(root, clusterUrl) {
  const { Client } = packages(root)('pg');
  const client = new Client(clusterUrl);
  await client.connect();
  try {
    const { rowCount } = await client.query("select 1 from pg_database where datname = 'outswell'");
    if (rowCount === 0) await client.query('create database outswell');
  } finally {
    await client.end();
  }
  return clusterUrl.replace(/postgres$/, 'outswell');
}

/**
 * Brings the tables up to date and says whether anybody is in them yet.
 *
 * @param {string} root @param {string} url
 * @param {{ alone: boolean }} options  alone: nobody else can be migrating this database, so a lock that a killed
 *   migration left is removed
 * @returns {Promise<{ applied: string[], empty: boolean }>}
 */
export async function migrate(root, url, { alone }) {
  const load = packages(root);
  const { migrations } = load('./knexfile.js');
  const db = load('knex')({
    client: 'pg',
    connection: { connectionString: url },
    pool: { min: 0, max: 2 },
    migrations,
  });
  try {
    await db.raw('select 1').catch((/** @type {Error} */ error) => {
      throw new Stop(`The database at ${new URL(url).host} cannot be used: ${error.message}`);
    });
    if (alone && (await db.schema.hasTable('knex_migrations_lock')))
      await db.migrate.forceFreeMigrationsLock();
    const [, applied] = await db.migrate.latest();
    const people = await db('people').select(db.raw('1')).first();
    return { applied, empty: people === undefined };
  } finally {
    await db.destroy();
  }
}
