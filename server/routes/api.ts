import express, { Router, type Request } from 'express';
import { CubeChange, CubeOverrides, CubeSource, SpectrumQuery } from '@/shared/contract/cubes';
import { FitDraft } from '@/shared/contract/fits';
import { MemberChange, MemberDraft, TokenDraft, type Me } from '@/shared/contract/people';
import { ReadingDraft } from '@/shared/contract/readings';
import { RegionChange, RegionDraft } from '@/shared/contract/regions';
import { CatalogueQuery, DistanceDraft, ShellChange, ShellDraft } from '@/shared/contract/shells';
import { TraceDraft } from '@/shared/contract/traces';
import { contextOf } from '../auth/requests';
import { catalogue, everyRow } from '../services/catalogue';
import { catalogueCsv } from '../services/catalogueCsv';
import { chooseSource, overrideCube } from '../services/cubeOverrides';
import * as cubes from '../services/cubes';
import * as distances from '../services/distances';
import { drawsOf } from '../services/fitDraws';
import * as fits from '../services/fits';
import * as members from '../services/members';
import * as readings from '../services/readings';
import * as regions from '../services/regions';
import * as shells from '../services/shells';
import { spectrumOf } from '../services/spectra';
import * as tokens from '../services/tokens';
import * as traces from '../services/traces';
import { uploadsOfRegion } from '../services/uploads';
import { imageRoutes } from './images';
import { idOf, parse } from './problems';
import { planeRoutes } from './planes';

const list = <T>(items: T[]) => ({ items, total: items.length, next: null });
const channelOf = (req: Request) =>
  Number(/^\d{1,7}$/.test(String(req.params.channel)) ? req.params.channel : NaN);

/** Every JSON route: parse by the contract, call a service, shape the answer. */
export function apiRoutes(): Router {
  const api = Router();
  api.use(
    (req, _res, next) => {
      contextOf(req); // nobody learns what a body should look like before signing in
      next();
    },
    express.json({ limit: '8mb' }),
  );

  api.get('/me', (req, res) => {
    const { actor } = contextOf(req);
    const me: Me = {
      ...actor,
      csrfToken: req.signedInBy === 'session' ? (req.session.csrf ?? null) : null,
    };
    res.json(me);
  });

  api.get('/members', async (req, res) => void res.json(list(await members.membersOfTeam(contextOf(req)))));
  api.post('/members', async (req, res) => {
    res.status(201).json(await members.addMember(contextOf(req), parse(MemberDraft, req.body)));
  });
  api.patch('/members/:personId', async (req, res) => {
    const { role } = parse(MemberChange, req.body);
    res.json(await members.changeMember(contextOf(req), idOf(req, 'personId'), role));
  });
  api.delete('/members/:personId', async (req, res) => {
    await members.removeMember(contextOf(req), idOf(req, 'personId'));
    res.status(204).end();
  });

  api.get('/tokens', async (req, res) => void res.json(list(await tokens.myTokens(contextOf(req)))));
  api.post('/tokens', async (req, res) => {
    res.status(201).json(await tokens.makeToken(contextOf(req), parse(TokenDraft, req.body).name));
  });
  api.delete('/tokens/:tokenId', async (req, res) => {
    await tokens.revokeMyToken(contextOf(req), idOf(req, 'tokenId'));
    res.status(204).end();
  });

  api.get('/regions', async (req, res) => void res.json(list(await regions.regionsOfTeam(contextOf(req)))));
  api.post('/regions', async (req, res) => {
    res.status(201).json(await regions.createRegion(contextOf(req), parse(RegionDraft, req.body)));
  });
  api.get('/regions/:regionId', async (req, res) => {
    res.json(await regions.readRegion(contextOf(req), idOf(req, 'regionId')));
  });
  api.patch('/regions/:regionId', async (req, res) => {
    res.json(
      await regions.changeRegion(contextOf(req), idOf(req, 'regionId'), parse(RegionChange, req.body)),
    );
  });
  api.get('/regions/:regionId/uploads', async (req, res) => {
    res.json(list(await uploadsOfRegion(contextOf(req), idOf(req, 'regionId'))));
  });

  api.get('/regions/:regionId/cubes', async (req, res) => {
    res.json(list(await cubes.cubesOfRegion(contextOf(req), idOf(req, 'regionId'))));
  });
  api.get('/cubes/:cubeId', async (req, res) => {
    res.json(await cubes.readCube(contextOf(req), idOf(req, 'cubeId')));
  });
  api.patch('/cubes/:cubeId', async (req, res) => {
    res.json(await cubes.changeCube(contextOf(req), idOf(req, 'cubeId'), parse(CubeChange, req.body).name));
  });
  api.delete('/cubes/:cubeId', async (req, res) => {
    await cubes.removeCube(contextOf(req), idOf(req, 'cubeId'));
    res.status(204).end();
  });
  api.patch('/cubes/:cubeId/overrides', async (req, res) => {
    res.json(await overrideCube(contextOf(req), idOf(req, 'cubeId'), parse(CubeOverrides, req.body)));
  });
  api.patch('/cubes/:cubeId/source', async (req, res) => {
    res
      .status(202)
      .json(await chooseSource(contextOf(req), idOf(req, 'cubeId'), parse(CubeSource, req.body)));
  });
  api.post('/cubes/:cubeId/restore', async (req, res) => {
    res.json(await cubes.restoreCube(contextOf(req), idOf(req, 'cubeId')));
  });
  api.post('/cubes/:cubeId/retry', async (req, res) => {
    res.status(202).json(await cubes.retryCube(contextOf(req), idOf(req, 'cubeId')));
  });
  api.post('/cubes/:cubeId/cancel', async (req, res) => {
    res.status(202).json(await cubes.cancelCube(contextOf(req), idOf(req, 'cubeId')));
  });
  api.get('/cubes/:cubeId/header', async (req, res) => {
    res.json(await cubes.headerOf(contextOf(req), idOf(req, 'cubeId')));
  });
  api.get('/cubes/:cubeId/channels', async (req, res) => {
    res.json(list(await cubes.channelsOf(contextOf(req), idOf(req, 'cubeId'))));
  });
  api.get('/cubes/:cubeId/spectrum', async (req, res) => {
    res.json(await spectrumOf(contextOf(req), idOf(req, 'cubeId'), parse(SpectrumQuery, req.query)));
  });
  planeRoutes(api, channelOf);
  imageRoutes(api);

  api.get('/regions/:regionId/shells', async (req, res) => {
    res.json(list(await shells.shellsOfRegion(contextOf(req), idOf(req, 'regionId'))));
  });
  api.post('/regions/:regionId/shells', async (req, res) => {
    const draft = parse(ShellDraft, req.body);
    res.status(201).json(await shells.createShell(contextOf(req), idOf(req, 'regionId'), draft));
  });
  api.get('/shells', async (req, res) => {
    res.json(await catalogue(contextOf(req), parse(CatalogueQuery, req.query)));
  });
  api.get('/shells.csv', async (req, res) => {
    const rows = await everyRow(contextOf(req), parse(CatalogueQuery, req.query));
    res.attachment('outswell-shells.csv').type('text/csv; charset=utf-8').send(catalogueCsv(rows));
  });
  api.get('/shells/:shellId', async (req, res) => {
    res.json(await shells.readShell(contextOf(req), idOf(req, 'shellId')));
  });
  api.patch('/shells/:shellId', async (req, res) => {
    res.json(await shells.changeShell(contextOf(req), idOf(req, 'shellId'), parse(ShellChange, req.body)));
  });
  api.delete('/shells/:shellId', async (req, res) => {
    await shells.removeShell(contextOf(req), idOf(req, 'shellId'));
    res.status(204).end();
  });
  api.post('/shells/:shellId/restore', async (req, res) => {
    res.json(await shells.restoreShell(contextOf(req), idOf(req, 'shellId')));
  });

  api.get('/shells/:shellId/readings/mine', async (req, res) => {
    res.json(await readings.myReading(contextOf(req), idOf(req, 'shellId')));
  });
  api.put('/shells/:shellId/readings/mine', async (req, res) => {
    const draft = parse(ReadingDraft, req.body);
    res.json(await readings.saveMyReading(contextOf(req), idOf(req, 'shellId'), draft));
  });

  api.get('/shells/:shellId/fits', async (req, res) => {
    res.json(list(await fits.fitsOfShell(contextOf(req), idOf(req, 'shellId'))));
  });
  api.post('/shells/:shellId/fits', async (req, res) => {
    const draft = parse(FitDraft, req.body);
    res.status(202).json(await fits.startFit(contextOf(req), idOf(req, 'shellId'), draft));
  });
  api.get(
    '/fits/:fitId',
    async (req, res) => void res.json(await fits.readFit(contextOf(req), idOf(req, 'fitId'))),
  );
  api.get('/fits/:fitId/marks', async (req, res) => {
    res.json(await fits.frozenMarksOf(contextOf(req), idOf(req, 'fitId')));
  });
  api.get('/fits/:fitId/draws', async (req, res) => {
    res.json(await drawsOf(contextOf(req), idOf(req, 'fitId')));
  });
  api.post('/fits/:fitId/cancel', async (req, res) => {
    res.status(202).json(await fits.cancelFit(contextOf(req), idOf(req, 'fitId')));
  });
  api.post('/fits/:fitId/retry', async (req, res) => {
    res.status(202).json(await fits.retryFit(contextOf(req), idOf(req, 'fitId')));
  });

  api.get('/shells/:shellId/traces', async (req, res) => {
    res.json(list(await traces.tracesOfShell(contextOf(req), idOf(req, 'shellId'))));
  });
  api.post('/shells/:shellId/traces', async (req, res) => {
    const draft = parse(TraceDraft, req.body);
    res.status(202).json(await traces.startTrace(contextOf(req), idOf(req, 'shellId'), draft));
  });
  api.get('/traces/:traceId', async (req, res) => {
    res.json(await traces.readTrace(contextOf(req), idOf(req, 'traceId')));
  });
  api.post('/traces/:traceId/cancel', async (req, res) => {
    res.status(202).json(await traces.cancelTrace(contextOf(req), idOf(req, 'traceId')));
  });

  api.get('/shells/:shellId/distances', async (req, res) => {
    res.json(list(await distances.distancesOf(contextOf(req), idOf(req, 'shellId'))));
  });
  api.post('/shells/:shellId/distances', async (req, res) => {
    const draft = parse(DistanceDraft, req.body);
    res.status(201).json(await distances.addDistance(contextOf(req), idOf(req, 'shellId'), draft));
  });
  return api;
}
