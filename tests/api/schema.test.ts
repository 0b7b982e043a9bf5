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

test('going back from traced rims takes them and their fits out, and leaves the rest', async () => {
  const { url, drop } = await freshDatabase();
  const knex = knexFactory({ client: 'pg', connection: url });
  const { migrations } = require('../../knexfile.js');
  const id = (n: number) => `00000000-0000-4000-8000-${String(n).padStart(12, '0')}`;
  const fit = `(id, shell_id, reading_id, cube_id, model, options, marks, reading_revision, status, outcome`;
  await knex.raw(`
    set session_replication_role = replica; -- people, regions and cubes are of no matter here
    insert into shells (id, region_id, name) values ('${id(1)}', '${id(2)}', 'Ring');
    insert into readings (id, shell_id, person_id, cube_id, marks, revision)
      values ('${id(3)}', '${id(1)}', '${id(4)}', '${id(5)}', '[]', 1);
    insert into fits ${fit}) values ('${id(6)}', '${id(1)}', '${id(3)}', '${id(5)}', 'sphere', '{}', '{}', 1, 'done', '{}');
    insert into traces (id, shell_id, fit_id, cube_id, edge, status, outcome, created_by)
      values ('${id(7)}', '${id(1)}', '${id(6)}', '${id(5)}', 'ridge', 'done', '{}', '${id(4)}');
    insert into readings (id, shell_id, person_id, cube_id, marks, revision, kind, trace_id)
      values ('${id(8)}', '${id(1)}', '${id(4)}', '${id(5)}', '[]', 1, 'traced', '${id(7)}');
    insert into fits ${fit}, trace_id) values
      ('${id(9)}', '${id(1)}', '${id(8)}', '${id(5)}', 'sphere', '{}', '{}', 1, 'done', '{}', '${id(7)}');
    update shells set adopted_fit_id = '${id(9)}', designation = 'GSH';
    set session_replication_role = origin;`);
  await knex.migrate.down({ ...migrations, name: '20261201120000_fit_extras.js' });
  expect(await knex('fits').pluck('id')).toEqual([id(6)]);
  expect(await knex('readings').pluck('id')).toEqual([id(3)]);
  expect(await knex('shells').first()).toMatchObject({ adopted_fit_id: null, designation: null });
  await expect(knex('fits').update({ outcome: '{"a": 1}' })).rejects.toThrow(/not changed once written/);
  await knex.migrate.latest(migrations);
  await knex.destroy();
  await drop();
});
