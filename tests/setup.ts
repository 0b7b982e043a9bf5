import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import knexFactory from 'knex';
import { startCluster, type Cluster } from '../scripts/machine/postgres.mjs';

declare global {
  var outswellCluster: { cluster: Cluster; dir: string } | undefined;
}

/**
 * One throw-away cluster for the whole run, with a migrated template that each test file copies (0.1–0.2 s).
 *
 * jest calls this once for each project that names it; the second call finds the first one's cluster.
 */
export default async function setup() {
  if (globalThis.outswellCluster) return;
  const dir = mkdtempSync(join(tmpdir(), 'outswell-test-'));
  const cluster = await startCluster(dir, { durable: false });
  globalThis.outswellCluster = { cluster, dir };
  const admin = knexFactory({ client: 'pg', connection: cluster.url });
  await admin.raw('create database template_outswell');
  await admin.destroy();
  const url = cluster.url.replace(/postgres$/, 'template_outswell');
  const knex = knexFactory({ client: 'pg', connection: url });
  await knex.migrate.latest(require('../knexfile.js').migrations);
  await knex.destroy();
  process.env.TEST_CLUSTER_URL = cluster.url;
}

export async function teardown() {
  const running = globalThis.outswellCluster;
  if (!running) return;
  await running.cluster.stop();
  rmSync(running.dir, { recursive: true, force: true });
  globalThis.outswellCluster = undefined;
}
