import { rows, type Db } from './db';

export interface DistanceRow {
  id: string;
  shellId: string;
  pc: number;
  errorPc: number | null;
  method: string;
  note: string;
  createdById: string | null;
  createdByName: string | null;
  createdAt: Date;
}

export const listDistances = (db: Db, shellId: string) =>
  rows<DistanceRow>(
    db,
    `select distances.id, distances.shell_id as "shellId", distances.pc, distances.error_pc as "errorPc",
            distances.method, distances.note, distances.created_by as "createdById", people.name as "createdByName",
            distances.created_at as "createdAt"
     from distances left join people on people.id = distances.created_by
     where distances.shell_id = ? order by distances.created_at desc, distances.id`,
    [shellId],
  );

export const insertDistance = (
  db: Db,
  d: { id: string; shellId: string; pc: number; errorPc: number | null; method: string; note: string; createdBy: string },
) =>
  db('distances').insert({
    id: d.id,
    shell_id: d.shellId,
    pc: d.pc,
    error_pc: d.errorPc,
    method: d.method,
    note: d.note,
    created_by: d.createdBy,
  });
