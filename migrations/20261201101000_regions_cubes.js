/** Regions, the files on their way in, and what the worker finds in a cube. */
exports.up = (knex) =>
  knex.schema.raw(`
    create table regions (
      id uuid primary key,
      team_id uuid not null references teams,
      name text not null check (length(name) between 1 and 80),
      description text not null default '',
      centre_l double precision,
      centre_b double precision,
      distance_pc double precision check (distance_pc > 0),
      distance_error_pc double precision check (distance_error_pc >= 0),
      created_by uuid references people,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now(),
      removed_at timestamptz,
      check ((centre_l is null) = (centre_b is null))
    );
    create index regions_team on regions (team_id);

    create table cubes (
      id uuid primary key,
      region_id uuid not null references regions,
      name text not null check (length(name) between 1 and 200),
      file_name text not null,
      file_key text not null unique,
      size_bytes bigint not null check (size_bytes >= 0),
      checksum text not null check (checksum ~ '^[0-9a-f]{64}$'),
      head jsonb,
      status text not null default 'uploaded' check (status in ('uploaded', 'ingesting', 'ready', 'failed', 'cancelled')),
      progress real not null default 0 check (progress between 0 and 1),
      activity text,
      problem jsonb,
      statistics jsonb,
      window_low double precision,
      window_high double precision,
      lease_holder text,
      lease_until timestamptz,
      created_by uuid references people,
      created_at timestamptz not null default now(),
      ready_at timestamptz,
      removed_at timestamptz
    );
    create index cubes_region on cubes (region_id);
    create index cubes_lease on cubes (lease_until) where status = 'ingesting';
    create unique index cubes_checksum on cubes (region_id, checksum) where removed_at is null;

    create table channels (
      cube_id uuid not null references cubes,
      channel integer not null check (channel >= 0),
      velocity double precision not null,
      minimum double precision,
      maximum double precision,
      mean double precision,
      rms double precision,
      rms_about_zero double precision,
      blanks integer not null,
      thumbnail bytea,
      primary key (cube_id, channel)
    );

    create table cube_images (
      cube_id uuid not null references cubes,
      kind text not null check (kind in ('total', 'strip')),
      meta jsonb not null,
      bytes bytea not null,
      primary key (cube_id, kind)
    );

    create table uploads (
      id text primary key,
      region_id uuid not null references regions,
      person_id uuid not null references people,
      file_name text not null,
      size_bytes bigint not null,
      received_bytes bigint not null default 0,
      status text not null default 'receiving' check (status in ('receiving', 'checking', 'refused', 'done', 'cancelled')),
      head_checked boolean not null default false,
      problem jsonb,
      cube_id uuid references cubes,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now()
    );
    create index uploads_region on uploads (region_id);
    create index uploads_person on uploads (person_id);
    create index uploads_cube on uploads (cube_id);
  `);
exports.down = (knex) =>
  knex.schema.raw(
    'drop table uploads; drop table cube_images; drop table channels; drop table cubes; drop table regions',
  );
