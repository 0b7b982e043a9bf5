import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import express, { Router, type Request, type Response } from 'express';

/**
 * The built client: files as they are, index.html for every other address, so that a link opens its screen. Text is
 * compressed once and kept; names under _expo carry a hash of their content and may be kept for ever.
 */
export function clientRoutes(dist: string): Router {
  const router = Router();
  const compressed = new Map<string, Buffer>();
  const sendText = (req: Request, res: Response, path: string, type: string) => {
    res.type(type).set('Vary', 'Accept-Encoding');
    if (!req.acceptsEncodings('gzip')) return void res.send(readFileSync(path));
    if (!compressed.has(path)) compressed.set(path, gzipSync(readFileSync(path), { level: 9 }));
    res.set('Content-Encoding', 'gzip').send(compressed.get(path));
  };
  router.get('/_expo/*rest', (req, res, next) => {
    const path = join(dist, req.path);
    if (!/^[\w./@()[\]-]+$/.test(req.path) || req.path.includes('..') || !existsSync(path)) return next();
    res.set('Cache-Control', 'public, max-age=31536000, immutable');
    if (/\.(js|css)$/.test(path))
      sendText(req, res, path, path.endsWith('.js') ? 'text/javascript' : 'text/css');
    else res.sendFile(path);
  });
  router.use(express.static(dist, { index: false, maxAge: '1h' }));
  router.get('/*path', (req, res, next) => (isPage(req) ? page(req, res) : next()));
  router.get('/', page);

  function page(req: Request, res: Response) {
    const index = join(dist, 'index.html');
    if (!existsSync(index)) {
      res.status(503).type('text/plain').send('The client is not built. Run npm start, or npm run build.\n');
      return;
    }
    // never kept: it names the files of this build. Not in the map either, as the next build has another
    res.set('Cache-Control', 'no-cache').type('html').send(readFileSync(index));
  }
  return router;
}

const isPage = (req: Request) => !/\.[a-z0-9]{2,5}$/i.test(req.path) && req.accepts('html') !== false;
