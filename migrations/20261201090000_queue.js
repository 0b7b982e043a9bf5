/** The job queue's own schema, made by the library that owns it, before anything may queue a job. */
const { runMigrations } = require('graphile-worker');
const { Pool } = require('pg');

exports.config = { transaction: false };
exports.up = async (knex) => {
  const pgPool = new Pool({ ...(await settingsOf(knex)), max: 1 });
  try {
    await runMigrations({ pgPool });
  } finally {
    await pgPool.end();
  }
};
exports.down = (knex) => knex.raw('drop schema graphile_worker cascade');

/** How knex is connected, from a live connection: its own settings hide the password. */
async function settingsOf(knex) {
  const connection = await knex.client.acquireConnection();
  const { host, port, user, password, database, ssl } = connection;
  await knex.client.releaseConnection(connection);
  return { host, port, user, password, database, ssl };
}
