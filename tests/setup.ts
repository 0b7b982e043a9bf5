import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import knexFactory from 'knex';
import { startCluster, type Cluster } from '../scripts/postgres';
declare global {
  var outswellCluster: { cluster: Cluster; dir: string } | undefined;
}
/** One throw-away cluster a run; a migrated template that each test file copies (0.1–0.2 s). */
export default async function setup() {
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
  const c = globalThis.outswellCluster;
  if (!c) return;
  await c.cluster.stop();
  rmSync(c.dir, { recursive: true, force: true });
}
