import type { ProblemBody } from '@/shared/contract/problem';
import { rows, type Db } from './db';

export interface UploadRow {
  id: string;
  teamId: string;
  regionId: string;
  personId: string;
  fileName: string;
  sizeBytes: number;
  receivedBytes: number;
  status: 'receiving' | 'checking' | 'refused' | 'done' | 'cancelled';
  headChecked: boolean;
  problem: ProblemBody | null;
  cubeId: string | null;
  createdAt: Date;
}
const columns = `
  uploads.id, regions.team_id as "teamId", uploads.region_id as "regionId", uploads.person_id as "personId", uploads.file_name as "fileName",
  uploads.size_bytes::float8 as "sizeBytes", uploads.received_bytes::float8 as "receivedBytes", uploads.status,
  uploads.head_checked as "headChecked", uploads.problem, uploads.cube_id as "cubeId", uploads.created_at as "createdAt"`;
const from = 'from uploads join regions on regions.id = uploads.region_id';

/** Uploads that still concern somebody: coming in, being checked, or refused within the last day. */
export const listUploads = (db: Db, regionId: string) =>
  rows<UploadRow>(
    db,
    `select ${columns} ${from}
     where uploads.region_id = ? and (uploads.status in ('receiving', 'checking')
       or (uploads.status = 'refused' and uploads.updated_at > now() - interval '1 day'))
     order by uploads.created_at desc`,
    [regionId],
  );

export async function findUpload(db: Db, id: string): Promise<UploadRow | undefined> {
  return (await rows<UploadRow>(db, `select ${columns} ${from} where uploads.id = ?`, [id]))[0];
}

export const insertUpload = (
  db: Db,
  upload: { id: string; regionId: string; personId: string; fileName: string; sizeBytes: number },
) =>
  db('uploads').insert({
    id: upload.id,
    region_id: upload.regionId,
    person_id: upload.personId,
    file_name: upload.fileName,
    size_bytes: upload.sizeBytes,
  });

export const updateUpload = (
  db: Db,
  id: string,
  change: Partial<{
    receivedBytes: number;
    status: UploadRow['status'];
    headChecked: boolean;
    problem: ProblemBody | null;
    cubeId: string;
  }>,
) =>
  db('uploads')
    .where({ id })
    .update({
      updated_at: db.fn.now(),
      ...(change.receivedBytes !== undefined && { received_bytes: change.receivedBytes }),
      ...(change.status !== undefined && { status: change.status }),
      ...(change.headChecked !== undefined && { head_checked: change.headChecked }),
      ...(change.problem !== undefined && { problem: change.problem && JSON.stringify(change.problem) }),
      ...(change.cubeId !== undefined && { cube_id: change.cubeId }),
    });

/** Every upload that is not over. */
export const openUploads = (db: Db) =>
  rows<UploadRow>(db, `select ${columns} ${from} where uploads.status in ('receiving', 'checking')`);
