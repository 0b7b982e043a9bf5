import type { CubeOverrides } from '@/shared/contract/cubes';
import type { ProblemBody } from '@/shared/contract/problem';
import type { CubeHead } from '@/shared/fits/cubeHead';
import type { PixelSource } from '@/shared/fits/cubeOrder';
import { rows, type Db } from './db';

export interface CubeStatistics {
  minimum: number | null;
  maximum: number | null;
  rms: number | null;
  blanks: number;
}
/** Copies of the pixels in another order, which ingest has made; null: not made. */
export interface CubeCopies {
  /** Plane by plane, where the uploaded file is not (or is not plain, or is large). */
  planesKey: string | null;
  /** Spectra together. */
  spectraKey: string | null;
  /** Every channel reduced. */
  reducedKey: string | null;
  layout: CopyLayout | null;
}
export interface CopyLayout {
  /** How pixels lie in the file of planes. */
  planes: PixelSource | null;
  spectra: { slab: number } | null;
  reduced: { block: number } | null;
}
export interface CubeRow extends CubeCopies {
  id: string;
  teamId: string;
  regionId: string;
  name: string;
  fileName: string;
  fileKey: string;
  sizeBytes: number;
  checksum: string;
  head: CubeHead | null;
  status: 'uploaded' | 'ingesting' | 'ready' | 'failed' | 'cancelled';
  progress: number;
  activity: string | null;
  problem: ProblemBody | null;
  statistics: CubeStatistics | null;
  windowLow: number | null;
  windowHigh: number | null;
  overrides: CubeOverrides | null;
  overriddenById: string | null;
  overriddenByName: string | null;
  overriddenAt: Date | null;
  /** null: the first cube of the file. */
  sourceHdu: number | null;
  sourceStokes: number;
  createdById: string | null;
  createdByName: string | null;
  createdAt: Date;
  readyAt: Date | null;
  removedAt: Date | null;
}

const columns = `
  cubes.id, regions.team_id as "teamId", cubes.region_id as "regionId", cubes.name, cubes.file_name as "fileName",
  cubes.file_key as "fileKey", cubes.size_bytes::float8 as "sizeBytes",
  cubes.planes_key as "planesKey", cubes.spectra_key as "spectraKey", cubes.reduced_key as "reducedKey", cubes.layout,
  cubes.checksum, cubes.head, cubes.status, cubes.progress, cubes.activity, cubes.problem, cubes.statistics,
  cubes.window_low as "windowLow", cubes.window_high as "windowHigh", cubes.created_by as "createdById",
  people.name as "createdByName", cubes.overrides, cubes.overridden_by as "overriddenById",
  overrider.name as "overriddenByName", cubes.overridden_at as "overriddenAt", cubes.source_hdu as "sourceHdu",
  cubes.source_stokes as "sourceStokes", cubes.created_at as "createdAt", cubes.ready_at as "readyAt",
  cubes.removed_at as "removedAt"`;
const from = `from cubes join regions on regions.id = cubes.region_id left join people on people.id = cubes.created_by
  left join people as overrider on overrider.id = cubes.overridden_by`;

export const listCubes = (db: Db, regionId: string) =>
  rows<CubeRow>(
    db,
    `select ${columns} ${from} where cubes.region_id = ? and cubes.removed_at is null order by cubes.created_at desc, cubes.id`,
    [regionId],
  );

/** Also a removed one: the service decides what may be done with it. */
export async function findCube(db: Db, id: string): Promise<CubeRow | undefined> {
  return (await rows<CubeRow>(db, `select ${columns} ${from} where cubes.id = ?`, [id]))[0];
}

export async function findCubeByChecksum(
  db: Db,
  regionId: string,
  checksum: string,
): Promise<CubeRow | undefined> {
  const found = await rows<CubeRow>(
    db,
    `select ${columns} ${from} where cubes.region_id = ? and cubes.checksum = ? and cubes.removed_at is null`,
    [regionId, checksum],
  );
  return found[0];
}

export const insertCube = (
  db: Db,
  cube: {
    id: string;
    regionId: string;
    name: string;
    fileName: string;
    fileKey: string;
    sizeBytes: number;
    checksum: string;
    head: CubeHead;
    createdBy: string;
  },
) =>
  db('cubes').insert({
    id: cube.id,
    region_id: cube.regionId,
    name: cube.name,
    file_name: cube.fileName,
    file_key: cube.fileKey,
    size_bytes: cube.sizeBytes,
    checksum: cube.checksum,
    head: JSON.stringify(cube.head),
    activity: 'waiting for a worker',
    created_by: cube.createdBy,
  });

export const renameCube = (db: Db, id: string, name: string) => db('cubes').where({ id }).update({ name });

export const setOverrides = (db: Db, id: string, overrides: CubeOverrides | null, personId: string) =>
  db('cubes')
    .where({ id })
    .update({
      overrides: overrides && JSON.stringify(overrides),
      overridden_by: overrides && personId,
      overridden_at: overrides && db.fn.now(),
    });

/** Another image or Stokes plane: the cube waits to be read again. False when it is being read. */
export async function setSource(db: Db, id: string, hdu: number, stokes: number): Promise<boolean> {
  const found = await rows(
    db,
    `update cubes set source_hdu = ?, source_stokes = ?, status = 'uploaded', progress = 0, problem = null,
            activity = 'waiting for a worker', lease_holder = null, lease_until = null
     where id = ? and status <> 'ingesting' and removed_at is null returning id`,
    [hdu, stokes, id],
  );
  return found.length > 0;
}

/** How many readings carry marks on the cube. */
export async function countMarked(db: Db, id: string): Promise<number> {
  const [row] = await rows<{ n: number }>(
    db,
    'select count(*)::int as n from readings where readings.cube_id = ? and jsonb_array_length(readings.marks) > 0',
    [id],
  );
  return row!.n;
}

export const setCubeRemoved = (db: Db, id: string, removed: boolean) =>
  db('cubes')
    .where({ id })
    .update({ removed_at: removed ? db.fn.now() : null });

/** From one of `before` to `after`; false when it was in another state by then. */
export async function moveCube(
  db: Db,
  id: string,
  before: CubeRow['status'][],
  after: CubeRow['status'],
  activity: string | null,
): Promise<boolean> {
  const found = await rows(
    db,
    `update cubes set status = ?, activity = ?, progress = 0, problem = null, lease_holder = null, lease_until = null
     where id = ? and status = any(?) and removed_at is null returning id`,
    [after, activity, id, before],
  );
  return found.length > 0;
}
