/** Working copies of a cube's pixels, the median of each channel, and the maps over all channels. */
exports.up = (knex) =>
  knex.schema.raw(`
    alter table cubes
      add column planes_key text,
      add column spectra_key text,
      add column reduced_key text,
      add column layout jsonb,
      add column attempt text;
    alter table channels add column median double precision;
    alter table cube_images drop constraint cube_images_kind_check;
    alter table cube_images add constraint cube_images_kind_check
      check (kind in ('total', 'velocity', 'dispersion', 'peak', 'strip'));
  `);
exports.down = (knex) =>
  knex.schema.raw(`
    delete from cube_images where kind not in ('total', 'strip');
    alter table cube_images drop constraint cube_images_kind_check;
    alter table cube_images add constraint cube_images_kind_check check (kind in ('total', 'strip'));
    alter table channels drop column median;
    alter table cubes
      drop column planes_key, drop column spectra_key, drop column reduced_key, drop column layout,
      drop column attempt;
  `);
