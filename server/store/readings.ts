import type { Mark } from '@/shared/contract/readings';
import { rows, type Db } from './db';

export interface ReadingRow {
  id: string;
  shellId: string;
  personId: string;
  cubeId: string;
  marks: Mark[];
  revision: number;
  updatedAt: Date;
}
const columns = `readings.id, readings.shell_id as "shellId", readings.person_id as "personId",
  readings.cube_id as "cubeId", readings.marks, readings.revision, readings.updated_at as "updatedAt"`;

export async function findReading(
  db: Db,
  shellId: string,
  personId: string,
): Promise<ReadingRow | undefined> {
  const found = await rows<ReadingRow>(
    db,
    `select ${columns} from readings where readings.shell_id = ? and readings.person_id = ?`,
    [shellId, personId],
  );
  return found[0];
}

export async function findReadingById(db: Db, id: string): Promise<ReadingRow | undefined> {
  return (await rows<ReadingRow>(db, `select ${columns} from readings where readings.id = ?`, [id]))[0];
}

/** The first save; undefined when another one came first. */
export async function insertReading(
  db: Db,
  reading: { id: string; shellId: string; personId: string; cubeId: string; marks: Mark[] },
): Promise<ReadingRow | undefined> {
  const found = await rows<ReadingRow>(
    db,
    `insert into readings (id, shell_id, person_id, cube_id, marks, revision) values (?, ?, ?, ?, ?::jsonb, 1)
     on conflict (shell_id, person_id) do nothing returning ${columns}`,
    [reading.id, reading.shellId, reading.personId, reading.cubeId, JSON.stringify(reading.marks)],
  );
  return found[0];
}

/** A later save; undefined when the stored revision is not the one it builds on. */
export async function updateReading(
  db: Db,
  id: string,
  revision: number,
  change: { cubeId: string; marks: Mark[] },
): Promise<ReadingRow | undefined> {
  const found = await rows<ReadingRow>(
    db,
    `update readings set marks = ?::jsonb, cube_id = ?, revision = revision + 1, updated_at = now()
     where id = ? and revision = ? returning ${columns}`,
    [JSON.stringify(change.marks), change.cubeId, id, revision],
  );
  return found[0];
}
