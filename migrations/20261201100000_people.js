/** People, their team, what signs them in. */
exports.up = async (knex) => {
  await knex.raw('create extension if not exists citext');
  await knex.schema.raw(`
    create table people (
      id uuid primary key,
      provider_id text not null unique,
      login citext not null unique,
      name text not null check (length(name) between 1 and 200),
      email text,
      created_at timestamptz not null default now()
    );
    create table teams (
      id uuid primary key,
      name text not null check (length(name) between 1 and 120),
      created_at timestamptz not null default now()
    );
    create table memberships (
      team_id uuid not null references teams,
      person_id uuid not null references people,
      role text not null check (role in ('lead', 'analyst', 'reviewer', 'reader')),
      created_at timestamptz not null default now(),
      primary key (team_id, person_id)
    );
    create unique index memberships_person on memberships (person_id);
    create table sessions (
      sid text primary key,
      sess json not null,
      expire timestamptz not null
    );
    create index sessions_expire on sessions (expire);
    create table tokens (
      id uuid primary key,
      person_id uuid not null references people,
      name text not null check (length(name) between 1 and 80),
      secret_hash text not null unique,
      created_at timestamptz not null default now(),
      last_used_at timestamptz,
      revoked_at timestamptz
    );
    create index tokens_person on tokens (person_id);
  `);
};
exports.down = (knex) =>
  knex.schema.raw(
    'drop table tokens; drop table sessions; drop table memberships; drop table teams; drop table people',
  );
