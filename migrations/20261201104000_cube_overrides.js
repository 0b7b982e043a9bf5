/** What a person says of a cube beside its header, and which part of the file is the cube. */
exports.up = (knex) =>
  knex.schema.raw(`
    alter table cubes
      add column overrides jsonb,
      add column overridden_by uuid references people,
      add column overridden_at timestamptz,
      add column source_hdu integer check (source_hdu >= 0),
      add column source_stokes integer not null default 0 check (source_stokes >= 0);
    create index cubes_overridden_by on cubes (overridden_by);
  `);
exports.down = (knex) =>
  knex.schema.raw(`
    alter table cubes
      drop column overrides, drop column overridden_by, drop column overridden_at,
      drop column source_hdu, drop column source_stokes;
  `);
