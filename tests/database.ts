import { randomUUID } from 'node:crypto';
import { Client } from 'pg';
/** A fresh, migrated database for one test file. */
export async function freshDatabase(): Promise<{ url: string; drop(): Promise<void> }> {
  const base = process.env.TEST_CLUSTER_URL!;
  const name = `t_${randomUUID().replaceAll('-', '')}`;
  const admin = async (sql: string) => {
    const c = new Client(base);
    await c.connect();
    try {
      await c.query(sql);
    } finally {
      await c.end();
    }
  };
  await admin(`create database ${name} template template_outswell`);
  return { url: base.replace(/postgres$/, name), drop: () => admin(`drop database ${name} with (force)`) };
}
