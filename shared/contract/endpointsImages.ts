import { listOf } from './common';
import { PlaneQuery } from './cubes';
import type { Endpoint } from './endpoint';
import { IMAGE_TYPES, ImageChange, ImageQuery, SkyImage } from './images';

export const IMAGE_ENDPOINTS: readonly Endpoint[] = [
  {
    method: 'get',
    path: '/regions/:regionId/images',
    summary: 'Companion images of a region',
    answer: { status: 200, schema: listOf(SkyImage) },
  },
  {
    method: 'post',
    path: '/regions/:regionId/images',
    summary:
      'Add a companion image: the body is the FITS file itself (two sky axes, no other longer than one; plain, gzip or tile-compressed; at most 64 MiB, 256 MiB expanded)',
    query: ImageQuery,
    binaryBody: IMAGE_TYPES,
    answer: { status: 201, schema: SkyImage },
  },
  {
    method: 'get',
    path: '/images/:imageId',
    summary: 'A companion image',
    answer: { status: 200, schema: SkyImage },
  },
  {
    method: 'patch',
    path: '/images/:imageId',
    summary: 'Rename a companion image',
    body: ImageChange,
    answer: { status: 200, schema: SkyImage },
  },
  {
    method: 'delete',
    path: '/images/:imageId',
    summary: 'Take a companion image out of the region; can be undone',
    answer: { status: 204 },
  },
  {
    method: 'post',
    path: '/images/:imageId/restore',
    summary: 'Undo taking a companion image out',
    answer: { status: 200, schema: SkyImage },
  },
  {
    method: 'get',
    path: '/images/:imageId/plane',
    summary: 'The numbers of a companion image, in the form of a plane of a cube',
    query: PlaneQuery,
    answer: { status: 200, binary: 'application/octet-stream' },
  },
];
