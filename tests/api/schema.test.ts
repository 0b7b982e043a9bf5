import knexFactory from 'knex';
import { freshDatabase } from '../database';
import { startProduct } from './harness';

const tables = `select table_name from information_schema.tables
  where table_schema = 'public' and table_type = 'BASE TABLE' and table_name not like 'knex_%' order by 1`;

test('the migrations go up, down and up again, and leave the same tables, each with a primary key', async () => {
  const { url, drop } = await freshDatabase();
  const knex = knexFactory({ client: 'pg', connection: url });
  const { migrations } = require('../../knexfile.js');
  const list = async () => (await knex.raw(tables)).rows.map((r: { table_name: string }) => r.table_name);
  const before = await list();
  expect(before).toContain('fits');
  await knex.migrate.rollback(migrations, true);
  expect(await list()).toEqual([]);
  await knex.migrate.latest(migrations);
  expect(await list()).toEqual(before);
  const keyed = await knex.raw(`select table_name from information_schema.table_constraints
    where constraint_type = 'PRIMARY KEY' and table_schema = 'public'`);
  expect(keyed.rows.map((r: { table_name: string }) => r.table_name)).toEqual(expect.arrayContaining(before));
  await knex.destroy();
  await drop();
});

test('every foreign key has an index that begins with its column', async () => {
  const { url, drop } = await freshDatabase();
  const knex = knexFactory({ client: 'pg', connection: url });
  const { rows } = await knex.raw(`
    select c.conrelid::regclass::text as "table", a.attname as "column"
    from pg_constraint c join pg_attribute a on a.attrelid = c.conrelid and a.attnum = c.conkey[1]
    where c.contype = 'f' and c.connamespace = 'public'::regnamespace and a.attname not in ('created_by')
      and not exists (select 1 from pg_index i where i.indrelid = c.conrelid and i.indkey[0] = c.conkey[1])`);
  expect(rows).toEqual([]);
  await knex.destroy();
  await drop();
});

test('the database itself refuses to change a finished fit or an event', async () => {
  const product = await startProduct();
  const lead = await product.signIn('lena');
  const { db } = product.parts;
  await lead.post('/regions', { name: 'Trial field' }).expect(201);
  await expect(db('events').update({ kind: 'forged' })).rejects.toThrow(/not changed once written/);
  await expect(db('events').delete()).rejects.toThrow(/not changed once written/);
  await product.stop();
});
