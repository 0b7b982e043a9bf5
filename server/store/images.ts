import type { ImageHead } from '@/shared/fits/imageHead';
import { rows, type Db } from './db';

export interface ImageRow {
  id: string;
  teamId: string;
  regionId: string;
  name: string;
  fileName: string;
  /** The file as it was sent. */
  fileKey: string;
  /** The copy that pixels are read from; null: the file itself. */
  plainKey: string | null;
  sizeBytes: number;
  checksum: string;
  head: ImageHead;
  createdById: string | null;
  createdByName: string | null;
  createdAt: Date;
  removedAt: Date | null;
}

const columns = `
  sky_images.id, regions.team_id as "teamId", sky_images.region_id as "regionId", sky_images.name,
  sky_images.file_name as "fileName", sky_images.file_key as "fileKey", sky_images.plain_key as "plainKey",
  sky_images.size_bytes::float8 as "sizeBytes", sky_images.checksum, sky_images.head,
  sky_images.created_by as "createdById", people.name as "createdByName", sky_images.created_at as "createdAt",
  sky_images.removed_at as "removedAt"`;
const from = `from sky_images join regions on regions.id = sky_images.region_id
  left join people on people.id = sky_images.created_by`;

export const listImages = (db: Db, regionId: string) =>
  rows<ImageRow>(
    db,
    `select ${columns} ${from} where sky_images.region_id = ? and sky_images.removed_at is null
     order by sky_images.created_at desc, sky_images.id`,
    [regionId],
  );

/** Also a removed one: the service decides what may be done with it. */
export async function findImage(db: Db, id: string): Promise<ImageRow | undefined> {
  return (await rows<ImageRow>(db, `select ${columns} ${from} where sky_images.id = ?`, [id]))[0];
}

export async function findImageByChecksum(
  db: Db,
  regionId: string,
  checksum: string,
): Promise<ImageRow | undefined> {
  const found = await rows<ImageRow>(
    db,
    `select ${columns} ${from}
     where sky_images.region_id = ? and sky_images.checksum = ? and sky_images.removed_at is null`,
    [regionId, checksum],
  );
  return found[0];
}

export const insertImage = (
  db: Db,
  image: Pick<
    ImageRow,
    'id' | 'regionId' | 'name' | 'fileName' | 'fileKey' | 'plainKey' | 'sizeBytes' | 'checksum' | 'head'
  > & { createdBy: string },
) =>
  db('sky_images').insert({
    id: image.id,
    region_id: image.regionId,
    name: image.name,
    file_name: image.fileName,
    file_key: image.fileKey,
    plain_key: image.plainKey,
    size_bytes: image.sizeBytes,
    checksum: image.checksum,
    head: JSON.stringify(image.head),
    created_by: image.createdBy,
  });

export const renameImage = (db: Db, id: string, name: string) =>
  db('sky_images').where({ id }).update({ name });

export const setImageRemoved = (db: Db, id: string, removed: boolean) =>
  db('sky_images')
    .where({ id })
    .update({ removed_at: removed ? db.fn.now() : null });
