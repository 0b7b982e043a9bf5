/** Shells, the marks people put on them, fits that never change once done, and who did what. */
exports.up = (knex) =>
  knex.schema
    .raw(
      `
    create table shells (
      id uuid primary key,
      region_id uuid not null references regions,
      name text not null check (length(name) between 1 and 80),
      note text not null default '',
      status text not null default 'draft'
        check (status in ('draft', 'in review', 'returned', 'accepted', 'withdrawn')),
      adopted_fit_id uuid,
      designation text,
      created_by uuid references people,
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now(),
      removed_at timestamptz
    );
    create index shells_region on shells (region_id);

    create table readings (
      id uuid primary key,
      shell_id uuid not null references shells,
      person_id uuid not null references people,
      cube_id uuid not null references cubes,
      marks jsonb not null,
      revision integer not null check (revision >= 1),
      created_at timestamptz not null default now(),
      updated_at timestamptz not null default now(),
      unique (shell_id, person_id)
    );
    create index readings_person on readings (person_id);
    create index readings_cube on readings (cube_id);

    create table fits (
      id uuid primary key,
      shell_id uuid not null references shells,
      reading_id uuid not null references readings,
      cube_id uuid not null references cubes,
      model text not null check (model in ('sphere', 'drifting', 'elliptical', 'cap')),
      options jsonb not null,
      marks jsonb not null,
      reading_revision integer not null,
      status text not null default 'queued' check (status in ('queued', 'running', 'done', 'failed', 'cancelled')),
      outcome jsonb,
      problem jsonb,
      lease_holder text,
      lease_until timestamptz,
      created_by uuid references people,
      created_at timestamptz not null default now(),
      finished_at timestamptz,
      check ((status = 'done') = (outcome is not null))
    );
    create index fits_shell on fits (shell_id);
    create index fits_reading on fits (reading_id);
    create index fits_cube on fits (cube_id);
    create index fits_lease on fits (lease_until) where status in ('queued', 'running');
    alter table shells add constraint shells_adopted_fit foreign key (adopted_fit_id) references fits;
    create index shells_adopted on shells (adopted_fit_id);

    create table distances (
      id uuid primary key,
      shell_id uuid not null references shells,
      pc double precision not null check (pc > 0),
      error_pc double precision check (error_pc >= 0),
      method text not null,
      note text not null default '',
      created_by uuid references people,
      created_at timestamptz not null default now()
    );
    create index distances_shell on distances (shell_id);

    create table events (
      id bigint generated always as identity primary key,
      at timestamptz not null default now(),
      team_id uuid not null references teams,
      person_id uuid references people,
      kind text not null,
      subject_id text not null,
      data jsonb not null default '{}'
    );
    create index events_team on events (team_id, id);
    create index events_subject on events (subject_id);
    create index events_person on events (person_id);
  `,
    )
    .then(() =>
      // the promises that the whole product rests on are kept by the database itself
      knex.schema.raw(`
      create function refuse_change() returns trigger language plpgsql as $$
      begin
        raise exception '% rows are not changed once written', tg_table_name using errcode = 'raise_exception';
      end $$;
      create trigger fits_immutable before update or delete on fits
        for each row when (old.status = 'done') execute function refuse_change();
      create trigger fits_frozen_input before update on fits
        for each row when (old.marks is distinct from new.marks or old.model is distinct from new.model
          or old.options is distinct from new.options) execute function refuse_change();
      create trigger events_append_only before update or delete on events
        for each row execute function refuse_change();
    `),
    );
exports.down = (knex) =>
  knex.schema.raw(`
    alter table shells drop constraint shells_adopted_fit;
    drop table events; drop table distances; drop table fits; drop table readings; drop table shells;
    drop function refuse_change();
  `);
