/** The job queue's own schema, made by the library that owns it, before anything may queue a job. */
const { runMigrations } = require('graphile-worker');

exports.config = { transaction: false };
exports.up = async (knex) => {
  const { connection } = knex.client.config;
  await runMigrations({
    connectionString: typeof connection === 'string' ? connection : connection.connectionString,
  });
};
exports.down = (knex) => knex.raw('drop schema graphile_worker cascade');
