/** How far a running fit is, the draws of its bootstrap, and rims traced from the brightness. */
exports.up = (knex) =>
  knex.schema.raw(`
    create table traces (
      id uuid primary key,
      shell_id uuid not null references shells,
      fit_id uuid not null references fits,
      cube_id uuid not null references cubes,
      edge text not null check (edge in ('ridge', 'inner')),
      status text not null default 'queued' check (status in ('queued', 'running', 'done', 'failed', 'cancelled')),
      progress real check (progress between 0 and 1),
      outcome jsonb,
      problem jsonb,
      reading_id uuid references readings,
      lease_holder text,
      lease_until timestamptz,
      created_by uuid not null references people,
      created_at timestamptz not null default now(),
      finished_at timestamptz,
      check ((status = 'done') = (outcome is not null)),
      check (reading_id is null or status = 'done'),
      check (progress is null or status = 'running')
    );
    create index traces_shell on traces (shell_id, created_at);
    create index traces_fit on traces (fit_id);
    create index traces_cube on traces (cube_id);
    create index traces_reading on traces (reading_id);
    create index traces_lease on traces (lease_until) where status in ('queued', 'running');
    create trigger traces_immutable before update or delete on traces
      for each row when (old.status = 'done') execute function refuse_change();
    create trigger traces_frozen_input before update on traces
      for each row when (old.fit_id is distinct from new.fit_id or old.edge is distinct from new.edge
        or old.cube_id is distinct from new.cube_id) execute function refuse_change();

    alter table readings
      add column kind text not null default 'hand' check (kind in ('hand', 'traced')),
      add column trace_id uuid references traces,
      add check ((kind = 'traced') = (trace_id is not null)),
      drop constraint readings_shell_id_person_id_key;
    create unique index readings_by_hand on readings (shell_id, person_id) where kind = 'hand';
    create unique index readings_trace on readings (trace_id);
    create index readings_shell on readings (shell_id);
    create trigger readings_traced_immutable before update or delete on readings
      for each row when (old.kind = 'traced') execute function refuse_change();

    alter table fits
      add column progress real check (progress between 0 and 1),
      add column activity text,
      add column draws bytea,
      add column trace_id uuid references traces,
      add check (draws is null or status = 'done'),
      add check ((progress is null and activity is null) or status = 'running');
    create index fits_trace on fits (trace_id);
    drop trigger fits_frozen_input on fits;
    create trigger fits_frozen_input before update on fits
      for each row when (old.marks is distinct from new.marks or old.model is distinct from new.model
        or old.options is distinct from new.options or old.trace_id is distinct from new.trace_id)
      execute function refuse_change();
  `);

/** Traced readings have no place in the tables of before, and so neither have the fits made of them, nor what started from those. */
exports.down = (knex) =>
  knex.schema.raw(`
    drop trigger readings_traced_immutable on readings;
    drop trigger fits_immutable on fits;
    drop trigger fits_frozen_input on fits;
    update shells set adopted_fit_id = null, designation = null
      where adopted_fit_id in (select id from fits where trace_id is not null);
    alter table readings drop column trace_id cascade;
    alter table fits drop constraint fits_trace_id_fkey;
    drop table traces;
    delete from fits where trace_id is not null;
    delete from readings where kind = 'traced';
    alter table fits drop column progress, drop column activity, drop column draws, drop column trace_id;
    drop index readings_by_hand;
    drop index readings_shell;
    alter table readings drop column kind,
      add constraint readings_shell_id_person_id_key unique (shell_id, person_id);
    create trigger fits_immutable before update or delete on fits
      for each row when (old.status = 'done') execute function refuse_change();
    create trigger fits_frozen_input before update on fits
      for each row when (old.marks is distinct from new.marks or old.model is distinct from new.model
        or old.options is distinct from new.options) execute function refuse_change();
  `);
