import type { Region, RegionChange, RegionDraft } from '@/shared/contract/regions';
import { isoTime, rows, type Db } from './db';

interface RegionRow {
  id: string;
  team_id: string;
  name: string;
  description: string;
  centre_l: number | null;
  centre_b: number | null;
  distance_pc: number | null;
  distance_error_pc: number | null;
  created_at: Date;
  updated_at: Date;
  cubes: number;
  shells: number;
  uploads: number;
  ingesting: number;
  failed_cubes: number;
  running_fits: number;
  unfitted: number;
}

const toRegion = (row: RegionRow): Region => ({
  id: row.id,
  name: row.name,
  description: row.description,
  centre: row.centre_l === null || row.centre_b === null ? null : { l: row.centre_l, b: row.centre_b },
  distance: row.distance_pc === null ? null : { pc: row.distance_pc, errorPc: row.distance_error_pc },
  counts: { cubes: row.cubes, shells: row.shells },
  waiting: {
    uploads: row.uploads,
    ingesting: row.ingesting,
    failedCubes: row.failed_cubes,
    runningFits: row.running_fits,
    unfitted: row.unfitted,
  },
  createdAt: isoTime(row.created_at),
  updatedAt: isoTime(row.updated_at),
});

// one query however many regions there are
const select = `
  select regions.id, regions.team_id, regions.name, regions.description, regions.centre_l, regions.centre_b,
         regions.distance_pc, regions.distance_error_pc, regions.created_at, regions.updated_at,
         coalesce(c.cubes, 0)::int as cubes, coalesce(c.ingesting, 0)::int as ingesting,
         coalesce(c.failed_cubes, 0)::int as failed_cubes, coalesce(u.uploads, 0)::int as uploads,
         coalesce(s.shells, 0)::int as shells, coalesce(s.unfitted, 0)::int as unfitted,
         coalesce(f.running_fits, 0)::int as running_fits
  from regions
  left join lateral (
    select count(*) as cubes,
           count(*) filter (where cubes.status in ('uploaded', 'ingesting')) as ingesting,
           count(*) filter (where cubes.status = 'failed') as failed_cubes
    from cubes where cubes.region_id = regions.id and cubes.removed_at is null) c on true
  left join lateral (
    select count(*) as uploads from uploads
    where uploads.region_id = regions.id and uploads.status in ('receiving', 'checking')) u on true
  left join lateral (
    select count(*) as shells,
           count(*) filter (where shells.adopted_fit_id is null and exists (
             select 1 from readings
             where readings.shell_id = shells.id and readings.kind = 'hand' and jsonb_array_length(readings.marks) > 0
           )) as unfitted
    from shells where shells.region_id = regions.id and shells.removed_at is null) s on true
  left join lateral (
    select count(*) as running_fits from fits join shells on shells.id = fits.shell_id
    where shells.region_id = regions.id and shells.removed_at is null and fits.status in ('queued', 'running')) f on true`;

export async function listRegions(db: Db, teamId: string): Promise<Region[]> {
  const found = await rows<RegionRow>(
    db,
    `${select} where regions.team_id = ? and regions.removed_at is null order by regions.name, regions.id`,
    [teamId],
  );
  return found.map(toRegion);
}

/** The region with the team it belongs to; the service decides who may see it. */
export async function findRegion(
  db: Db,
  id: string,
): Promise<{ teamId: string; region: Region } | undefined> {
  const [row] = await rows<RegionRow>(db, `${select} where regions.id = ? and regions.removed_at is null`, [
    id,
  ]);
  return row && { teamId: row.team_id, region: toRegion(row) };
}

export const insertRegion = (db: Db, id: string, teamId: string, personId: string, draft: RegionDraft) =>
  db('regions').insert({
    id,
    team_id: teamId,
    name: draft.name,
    description: draft.description,
    centre_l: draft.centre?.l ?? null,
    centre_b: draft.centre?.b ?? null,
    distance_pc: draft.distance?.pc ?? null,
    distance_error_pc: draft.distance?.errorPc ?? null,
    created_by: personId,
  });

export const updateRegion = (db: Db, id: string, change: RegionChange) =>
  db('regions')
    .where({ id })
    .update({
      updated_at: db.fn.now(),
      ...(change.name !== undefined && { name: change.name }),
      ...(change.description !== undefined && { description: change.description }),
      ...(change.centre !== undefined && {
        centre_l: change.centre?.l ?? null,
        centre_b: change.centre?.b ?? null,
      }),
      ...(change.distance !== undefined && {
        distance_pc: change.distance?.pc ?? null,
        distance_error_pc: change.distance?.errorPc ?? null,
      }),
    });
