import type { Router } from 'express';
import { PlaneQuery } from '@/shared/contract/cubes';
import { IMAGE_TYPES, ImageChange, ImageQuery } from '@/shared/contract/images';
import { Problem } from '@/shared/contract/problem';
import { contextOf } from '../auth/requests';
import { addImage } from '../services/addImage';
import * as images from '../services/images';
import { isFresh, sendPlane } from './planes';
import { idOf, parse } from './problems';

/** Companion images of a region: files, records and numbers. */
export function imageRoutes(api: Router): void {
  api.get('/regions/:regionId/images', async (req, res) => {
    const items = await images.imagesOfRegion(contextOf(req), idOf(req, 'regionId'));
    res.json({ items, total: items.length, next: null });
  });
  api.post('/regions/:regionId/images', async (req, res) => {
    const { fileName } = parse(ImageQuery, req.query);
    const regionId = idOf(req, 'regionId');
    if (req.is([...IMAGE_TYPES]) === false)
      throw new Problem(
        'invalid-input',
        'Send the file itself as the body, as application/fits or application/octet-stream.',
        { field: 'Content-Type' },
      );
    try {
      const image = await addImage(contextOf(req), regionId, {
        fileName,
        declaredBytes: Number(req.get('content-length') ?? NaN),
        bytes: req.iterator({ destroyOnReturn: false }), // a refusal is answered on the same connection
      });
      res.status(201).json(image);
    } finally {
      req.resume(); // what is not wanted any more is read away
    }
  });
  api.get('/images/:imageId', async (req, res) => {
    res.json(await images.readImage(contextOf(req), idOf(req, 'imageId')));
  });
  api.patch('/images/:imageId', async (req, res) => {
    const { name } = parse(ImageChange, req.body);
    res.json(await images.changeImage(contextOf(req), idOf(req, 'imageId'), name));
  });
  api.delete('/images/:imageId', async (req, res) => {
    await images.removeImage(contextOf(req), idOf(req, 'imageId'));
    res.status(204).end();
  });
  api.post('/images/:imageId/restore', async (req, res) => {
    res.json(await images.restoreImage(contextOf(req), idOf(req, 'imageId')));
  });
  api.get('/images/:imageId/plane', async (req, res) => {
    const query = parse(PlaneQuery, req.query);
    const { checksum } = await images.readImage(contextOf(req), idOf(req, 'imageId'));
    if (isFresh(req, res, checksum)) return; // the bytes of an image never change
    sendPlane(res, await images.imagePlane(contextOf(req), idOf(req, 'imageId'), query));
  });
}
