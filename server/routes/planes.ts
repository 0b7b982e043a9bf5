import type { Request, Response, Router } from 'express';
import { PLANE_HEADERS } from '@/shared/contract/cubes';
import { contextOf } from '../auth/requests';
import { planeOf, stripOf, thumbnailOf, totalOf, type PlaneAnswer } from '../services/planes';
import { idOf } from './problems';

/** A ready cube never changes, so a browser may keep its pictures; private, as they are one team's. */
const KEEP = 'private, max-age=31536000, immutable';

/** Pictures and numbers of a cube that are not JSON. */
export function planeRoutes(
  api: Router,
  read: { channelOf: (req: Request) => number; planeQuery: (req: Request) => { size?: number | undefined } },
): void {
  api.get('/cubes/:cubeId/channels/:channel/thumbnail', async (req, res) => {
    const bytes = await thumbnailOf(contextOf(req), idOf(req, 'cubeId'), read.channelOf(req));
    res.set('Cache-Control', KEEP).type('image/webp').send(bytes);
  });
  api.get('/cubes/:cubeId/strip', async (req, res) => {
    const { bytes, meta } = await stripOf(contextOf(req), idOf(req, 'cubeId'));
    res.set('Cache-Control', KEEP).set('Strip-Step', String(meta.step)).type('image/webp').send(bytes);
  });
  api.get('/cubes/:cubeId/channels/:channel/plane', async (req, res) => {
    const { size } = read.planeQuery(req);
    sendPlane(res, await planeOf(contextOf(req), idOf(req, 'cubeId'), read.channelOf(req), size));
  });
  api.get('/cubes/:cubeId/total', async (req, res) => {
    sendPlane(res, await totalOf(contextOf(req), idOf(req, 'cubeId')));
  });
}

function sendPlane(res: Response, plane: PlaneAnswer) {
  // every machine this runs on is little-endian, as the contract promises
  const { buffer, byteOffset, byteLength } = plane.values;
  res
    .set({
      'Cache-Control': KEEP,
      [PLANE_HEADERS.width]: String(plane.nx),
      [PLANE_HEADERS.height]: String(plane.ny),
      [PLANE_HEADERS.scale]: String(plane.scale),
      [PLANE_HEADERS.offset]: String(plane.offset),
      [PLANE_HEADERS.blank]: String(plane.blank),
      [PLANE_HEADERS.block]: String(plane.block),
    })
    .type('application/octet-stream')
    .send(Buffer.from(buffer, byteOffset, byteLength));
}
