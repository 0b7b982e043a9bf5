import type { Request, Response, Router } from 'express';
import {
  CUT_HEADERS,
  CutQuery,
  MAP_KINDS,
  PLANE_HEADERS,
  PlaneQuery,
  type MapKind,
} from '@/shared/contract/cubes';
import { contextOf } from '../auth/requests';
import { notFound } from '../services/access';
import { cutOf, INTERPOLATION } from '../services/cuts';
import { mapOf, planeOf, stripOf, thumbnailOf, versionOf, type PlaneAnswer } from '../services/planes';
import { idOf, parse } from './problems';

/**
 * A browser may keep pictures and numbers; private, as they are one team's. Whoever shows a cube puts its `readyAt`
 * into the address, so that one that is read again is asked for anew.
 */
const KEEP = 'private, max-age=31536000, immutable';

/** Pictures and numbers of a cube that are not JSON. */
export function planeRoutes(api: Router, channelOf: (req: Request) => number): void {
  api.get('/cubes/:cubeId/channels/:channel/thumbnail', async (req, res) => {
    if (await isKept(req, res)) return;
    res.type('image/webp').send(await thumbnailOf(contextOf(req), idOf(req, 'cubeId'), channelOf(req)));
  });
  api.get('/cubes/:cubeId/strip', async (req, res) => {
    if (await isKept(req, res)) return;
    const { bytes, meta } = await stripOf(contextOf(req), idOf(req, 'cubeId'));
    res.set('Strip-Step', String(meta.step)).type('image/webp').send(bytes);
  });
  api.get('/cubes/:cubeId/channels/:channel/plane', async (req, res) => {
    const query = parse(PlaneQuery, req.query);
    if (await isKept(req, res)) return;
    sendPlane(res, await planeOf(contextOf(req), idOf(req, 'cubeId'), channelOf(req), query));
  });
  api.get('/cubes/:cubeId/maps/:kind', async (req, res) => {
    const kind = MAP_KINDS.find((name) => name === req.params.kind) as MapKind | undefined;
    if (!kind) throw notFound('map');
    if (await isKept(req, res)) return;
    const map = await mapOf(contextOf(req), idOf(req, 'cubeId'), kind);
    if (map.mask) res.set(PLANE_HEADERS.mask, printable(map.mask));
    sendPlane(res, map);
  });
  api.get('/cubes/:cubeId/cut', async (req, res) => {
    const query = parse(CutQuery, req.query);
    if (await isKept(req, res)) return;
    const cut = await cutOf(contextOf(req), idOf(req, 'cubeId'), query);
    res.set({ [CUT_HEADERS.step]: String(cut.step), [CUT_HEADERS.interpolation]: INTERPOLATION });
    sendPlane(res, cut);
  });
}

/** Name the version of the cube; true when the asker has it already, and has been told so. */
const isKept = async (req: Request, res: Response): Promise<boolean> =>
  isFresh(req, res, await versionOf(contextOf(req), idOf(req, 'cubeId')));

/** Let the browser keep what is answered under this version; true when it has it already, and has been told so. */
export function isFresh(req: Request, res: Response, version: string): boolean {
  res.set({ ETag: `"${version}"`, 'Cache-Control': KEEP });
  if (!req.fresh) return false;
  res.status(304).end();
  return true;
}

/** A header carries no other letters; units of a file may. */
const printable = (text: string) => text.replace(/[^\x20-\x7e]/g, '?');

export function sendPlane(res: Response, plane: PlaneAnswer) {
  // every machine this runs on is little-endian, as the contract promises
  const { buffer, byteOffset, byteLength } = plane.values;
  res
    .set({
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
