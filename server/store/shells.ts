import type { CatalogueQuery } from '@/shared/contract/shells';
import type { FitOutcome } from '@/shared/contract/fits';
import { rows, type Db } from './db';

/** Of the adopted fit, what a list needs: not its residuals and rings. */
export type AdoptedOutcome = Pick<
  FitOutcome,
  'model' | 'parameters' | 'correlation' | 'chi2' | 'dof' | 'warnings' | 'provenance'
>;

export interface ShellRow {
  id: string;
  teamId: string;
  regionId: string;
  regionName: string;
  name: string;
  note: string;
  status: 'draft' | 'in review' | 'returned' | 'accepted' | 'withdrawn';
  designation: string | null;
  adoptedFitId: string | null;
  outcome: AdoptedOutcome | null;
  distancePc: number | null;
  distanceErrorPc: number | null;
  regionDistancePc: number | null;
  regionDistanceErrorPc: number | null;
  readings: {
    id: string;
    cubeId: string;
    personId: string;
    personName: string;
    marks: number;
    channels: number;
    updatedAt: string;
  }[];
  fits: number;
  createdById: string | null;
  createdByName: string | null;
  createdAt: Date;
  updatedAt: Date;
  removedAt: Date | null;
}

const select = `
  select shells.id, regions.team_id as "teamId", shells.region_id as "regionId", regions.name as "regionName",
         shells.name, shells.note, shells.status, shells.designation, shells.adopted_fit_id as "adoptedFitId",
         fits.outcome - '{residuals,rings,extra}'::text[] as outcome, newest.pc as "distancePc", newest.error_pc as "distanceErrorPc",
         regions.distance_pc as "regionDistancePc", regions.distance_error_pc as "regionDistanceErrorPc",
         coalesce(marked.readings, '[]') as readings, coalesce(counted.fits, 0)::int as fits,
         shells.created_by as "createdById", people.name as "createdByName", shells.created_at as "createdAt",
         shells.updated_at as "updatedAt", shells.removed_at as "removedAt"
  from shells
  join regions on regions.id = shells.region_id
  left join people on people.id = shells.created_by
  left join fits on fits.id = shells.adopted_fit_id
  left join lateral (
    select distances.pc, distances.error_pc from distances where distances.shell_id = shells.id
    order by distances.created_at desc limit 1) newest on true
  left join lateral (
    select count(*) as fits from fits as all_fits where all_fits.shell_id = shells.id) counted on true
  left join lateral (
    select json_agg(json_build_object(
             'id', readings.id, 'cubeId', readings.cube_id, 'personId', readings.person_id, 'personName', reader.name,
             'marks', jsonb_array_length(readings.marks),
             'channels', (select count(distinct mark ->> 'channel') from jsonb_array_elements(readings.marks) as mark),
             'updatedAt', readings.updated_at) order by readings.created_at) as readings
    from readings join people as reader on reader.id = readings.person_id
    where readings.shell_id = shells.id and readings.kind = 'hand' and jsonb_array_length(readings.marks) > 0) marked on true`;

/** Also a removed one: the service decides what may be done with it. */
export async function findShell(db: Db, id: string): Promise<ShellRow | undefined> {
  return (await rows<ShellRow>(db, `${select} where shells.id = ?`, [id]))[0];
}

export const listShells = (db: Db, regionId: string) =>
  rows<ShellRow>(
    db,
    `${select} where shells.region_id = ? and shells.removed_at is null order by shells.created_at, shells.id`,
    [regionId],
  );

/** Every shell of the team that passes the filters on stored columns; what is derived is filtered by the service. */
export function listCatalogue(
  db: Db,
  teamId: string,
  filter: {
    regions: string[] | null;
    statuses: string[] | null;
    search: string | null;
    adopted: CatalogueQuery['adopted'];
  },
) {
  return rows<ShellRow>(
    db,
    `${select}
     where regions.team_id = ? and shells.removed_at is null and regions.removed_at is null
       and (?::uuid[] is null or shells.region_id = any(?::uuid[]))
       and (?::text[] is null or shells.status = any(?::text[]))
       and (?::text is null or position(lower(?::text) in lower(shells.name || ' ' || coalesce(shells.designation, ''))) > 0)
       and (? = 'any' or shells.adopted_fit_id is not null)`,
    [
      teamId,
      filter.regions as never,
      filter.regions as never,
      filter.statuses as never,
      filter.statuses as never,
      filter.search as never,
      filter.search as never,
      filter.adopted,
    ],
  );
}

export const insertShell = (
  db: Db,
  shell: { id: string; regionId: string; name: string; note: string; createdBy: string },
) =>
  db('shells').insert({
    id: shell.id,
    region_id: shell.regionId,
    name: shell.name,
    note: shell.note,
    created_by: shell.createdBy,
  });

export const updateShell = (
  db: Db,
  id: string,
  change: Partial<{
    name: string;
    note: string;
    status: ShellRow['status'];
    adoptedFitId: string | null;
    designation: string | null;
    removed: boolean;
  }>,
) =>
  db('shells')
    .where({ id })
    .update({
      updated_at: db.fn.now(),
      ...(change.name !== undefined && { name: change.name }),
      ...(change.note !== undefined && { note: change.note }),
      ...(change.status !== undefined && { status: change.status }),
      ...(change.adoptedFitId !== undefined && { adopted_fit_id: change.adoptedFitId }),
      ...(change.designation !== undefined && { designation: change.designation }),
      ...(change.removed !== undefined && { removed_at: change.removed ? db.fn.now() : null }),
    });
