import { randomUUID } from 'node:crypto';
import { Client } from 'pg';

/**
 * A fresh, migrated database for one test file: a copy of the template that tests/setup.ts made.
 *
 * Call drop() in afterAll, after closing whatever uses it; it also ends connections that are left.
 */
export async function freshDatabase(): Promise<{ url: string; drop(): Promise<void> }> {
  const cluster = process.env.TEST_CLUSTER_URL;
  if (!cluster) throw new Error('There is no test cluster: run this file through jest with jest.config.js.');
  const name = `t_${randomUUID().replaceAll('-', '')}`;
  await run(cluster, `create database ${name} template template_outswell`);
  return {
    url: cluster.replace(/postgres$/, name),
    drop: () => run(cluster, `drop database ${name} with (force)`),
  };
}

async function run(url: string, sql: string): Promise<void> {
  const client = new Client(url);
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}
