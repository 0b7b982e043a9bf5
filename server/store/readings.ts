import type { Mark } from '@/shared/contract/readings';
import { rows, type Db } from './db';

export interface ReadingRow {
  id: string;
  shellId: string;
  /** Whose marks they are; of a traced rim, who had it traced. */
  personId: string;
  cubeId: string;
  /** Set where the marks are a traced rim. */
  traceId: string | null;
  marks: Mark[];
  revision: number;
  updatedAt: Date;
}
const columns = `readings.id, readings.shell_id as "shellId", readings.person_id as "personId",
  readings.cube_id as "cubeId", readings.trace_id as "traceId", readings.marks, readings.revision, readings.updated_at as "updatedAt"`;

/** What the person marked by hand. */
export async function findReading(
  db: Db,
  shellId: string,
  personId: string,
): Promise<ReadingRow | undefined> {
  const found = await rows<ReadingRow>(
    db,
    `select ${columns} from readings where readings.shell_id = ? and readings.person_id = ? and readings.kind = 'hand'`,
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
     on conflict (shell_id, person_id) where kind = 'hand' do nothing returning ${columns}`,
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

/** A traced rim is a reading of its own, written once. */
export const insertTracedReading = (
  db: Db,
  reading: { id: string; traceId: string; shellId: string; personId: string; cubeId: string; marks: Mark[] },
) =>
  db('readings').insert({
    id: reading.id,
    kind: 'traced',
    trace_id: reading.traceId,
    shell_id: reading.shellId,
    person_id: reading.personId,
    cube_id: reading.cubeId,
    marks: JSON.stringify(reading.marks),
    revision: 1,
  });
