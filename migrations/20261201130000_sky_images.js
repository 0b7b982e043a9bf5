/** Images of the same sky, added to a region to be laid over its cubes. */
exports.up = (knex) =>
  knex.schema.raw(`
    create table sky_images (
      id uuid primary key,
      region_id uuid not null references regions,
      name text not null check (length(name) between 1 and 200),
      file_name text not null,
      file_key text not null unique,
      plain_key text unique,
      size_bytes bigint not null check (size_bytes >= 0),
      checksum text not null check (checksum ~ '^[0-9a-f]{64}$'),
      head jsonb not null,
      created_by uuid references people,
      created_at timestamptz not null default now(),
      removed_at timestamptz
    );
    create index sky_images_region on sky_images (region_id);
    create unique index sky_images_checksum on sky_images (region_id, checksum) where removed_at is null;
  `);
exports.down = (knex) => knex.schema.raw('drop table sky_images');
