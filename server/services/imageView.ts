import type { SkyImage } from '@/shared/contract/images';
import { isoTime } from '../store/db';
import type { ImageRow } from '../store/images';

/** The row as it is answered. */
export const toImage = ({ head, ...row }: ImageRow): SkyImage => ({
  id: row.id,
  regionId: row.regionId,
  name: row.name,
  fileName: row.fileName,
  sizeBytes: row.sizeBytes,
  checksum: row.checksum,
  nx: head.shape.nx,
  ny: head.shape.ny,
  bitpix: head.bitpix,
  hdu: head.hdu,
  unit: head.unit,
  object: head.object,
  frame: head.frame,
  projection: head.projection,
  sky: { ...head.sky },
  cautions: head.cautions,
  createdBy: row.createdById ? { id: row.createdById, name: row.createdByName ?? '' } : null,
  createdAt: isoTime(row.createdAt),
});
