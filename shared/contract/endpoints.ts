/**
 * Every route of /api/v1 with its contract: the OpenAPI document is generated from this table, and a test holds the
 * server's routes to it, so that neither lists what the other lacks.
 */
import { z } from 'zod';
import { listOf } from './common';
import {
  ChannelList,
  Cube,
  CubeChange,
  CubeHeader,
  PlaneQuery,
  Spectrum,
  SpectrumQuery,
  UploadState,
} from './cubes';
import { Health } from './events';
import { Fit, FitDraft, FrozenMarks } from './fits';
import { Me, Member, MemberChange, MemberDraft, NewToken, Token, TokenDraft } from './people';
import { Reading, ReadingDraft } from './readings';
import { Region, RegionChange, RegionDraft } from './regions';
import { CatalogueQuery, Distance, DistanceDraft, Shell, ShellChange, ShellDraft } from './shells';

export interface Endpoint {
  method: 'get' | 'post' | 'put' | 'patch' | 'delete' | 'head';
  /** Express path below /api/v1, with `:name` parameters. */
  path: string;
  summary: string;
  /** true: answers without sign-in. */
  open?: boolean;
  query?: z.ZodObject;
  body?: z.ZodType;
  /** Status and body of success; `binary` names a media type that is not JSON. */
  answer: { status: number; schema?: z.ZodType; binary?: string };
}

export const ENDPOINTS: readonly Endpoint[] = [
  {
    method: 'get',
    path: '/health',
    summary: 'Whether the parts are running',
    open: true,
    answer: { status: 200, schema: Health },
  },
  {
    method: 'get',
    path: '/openapi.json',
    summary: 'This document',
    open: true,
    answer: { status: 200, schema: z.looseObject({}) },
  },
  {
    method: 'get',
    path: '/me',
    summary: 'The person, the team, the role',
    answer: { status: 200, schema: Me },
  },
  {
    method: 'get',
    path: '/events',
    summary: 'Server-sent events: what changed',
    answer: { status: 200, binary: 'text/event-stream' },
  },

  { method: 'get', path: '/members', summary: 'The team', answer: { status: 200, schema: listOf(Member) } },
  {
    method: 'post',
    path: '/members',
    summary: 'Take a person into the team',
    body: MemberDraft,
    answer: { status: 201, schema: Member },
  },
  {
    method: 'patch',
    path: '/members/:personId',
    summary: 'Change a role',
    body: MemberChange,
    answer: { status: 200, schema: Member },
  },
  {
    method: 'delete',
    path: '/members/:personId',
    summary: 'Let a person leave the team',
    answer: { status: 204 },
  },
  {
    method: 'get',
    path: '/tokens',
    summary: 'Personal access tokens',
    answer: { status: 200, schema: listOf(Token) },
  },
  {
    method: 'post',
    path: '/tokens',
    summary: 'Make a token; its secret is shown once',
    body: TokenDraft,
    answer: { status: 201, schema: NewToken },
  },
  { method: 'delete', path: '/tokens/:tokenId', summary: 'Revoke a token', answer: { status: 204 } },

  {
    method: 'get',
    path: '/regions',
    summary: 'Regions of the team',
    answer: { status: 200, schema: listOf(Region) },
  },
  {
    method: 'post',
    path: '/regions',
    summary: 'Make a region',
    body: RegionDraft,
    answer: { status: 201, schema: Region },
  },
  { method: 'get', path: '/regions/:regionId', summary: 'A region', answer: { status: 200, schema: Region } },
  {
    method: 'patch',
    path: '/regions/:regionId',
    summary: 'Rename or describe a region',
    body: RegionChange,
    answer: { status: 200, schema: Region },
  },

  {
    method: 'get',
    path: '/regions/:regionId/uploads',
    summary: 'Uploads begun and not finished',
    answer: { status: 200, schema: listOf(UploadState) },
  },
  {
    method: 'post',
    path: '/uploads',
    summary: 'Begin a resumable upload (tus 1.0; metadata filename, regionId)',
    answer: { status: 201 },
  },
  {
    method: 'head',
    path: '/uploads/:uploadId',
    summary: 'How far an upload is (tus)',
    answer: { status: 200 },
  },
  {
    method: 'patch',
    path: '/uploads/:uploadId',
    summary: 'Bytes of an upload (tus); the last answer carries Cube-Id',
    answer: { status: 204 },
  },
  {
    method: 'delete',
    path: '/uploads/:uploadId',
    summary: 'Cancel an upload (tus)',
    answer: { status: 204 },
  },

  {
    method: 'get',
    path: '/regions/:regionId/cubes',
    summary: 'Cubes of a region',
    answer: { status: 200, schema: listOf(Cube) },
  },
  { method: 'get', path: '/cubes/:cubeId', summary: 'A cube', answer: { status: 200, schema: Cube } },
  {
    method: 'patch',
    path: '/cubes/:cubeId',
    summary: 'Rename a cube',
    body: CubeChange,
    answer: { status: 200, schema: Cube },
  },
  {
    method: 'delete',
    path: '/cubes/:cubeId',
    summary: 'Take a cube out of the region; can be undone',
    answer: { status: 204 },
  },
  {
    method: 'post',
    path: '/cubes/:cubeId/restore',
    summary: 'Undo taking a cube out',
    answer: { status: 200, schema: Cube },
  },
  {
    method: 'post',
    path: '/cubes/:cubeId/retry',
    summary: 'Read a failed or cancelled cube again',
    answer: { status: 202, schema: Cube },
  },
  {
    method: 'post',
    path: '/cubes/:cubeId/cancel',
    summary: 'Stop reading a cube',
    answer: { status: 202, schema: Cube },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/header',
    summary: 'The header cards',
    answer: { status: 200, schema: CubeHeader },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/channels',
    summary: 'Velocity and statistics of each channel',
    answer: { status: 200, schema: ChannelList },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/channels/:channel/thumbnail',
    summary: 'A small picture; one brightness window for the cube',
    answer: { status: 200, binary: 'image/webp' },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/strip',
    summary: 'All thumbnails in one picture, side by side in the order of channels',
    answer: { status: 200, binary: 'image/webp' },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/channels/:channel/plane',
    summary:
      'A channel as little-endian unsigned 16-bit numbers, row y = 0 first: brightness = Plane-Offset + Plane-Scale × number, Plane-Blank where there is none; error at most half of Plane-Scale',
    query: PlaneQuery,
    answer: { status: 200, binary: 'application/octet-stream' },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/total',
    summary: 'Total intensity (sum over channels times the channel width), in the form of a plane',
    answer: { status: 200, binary: 'application/octet-stream' },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/spectrum',
    summary: 'Mean spectrum of the cube, or of a disc about a pixel',
    query: SpectrumQuery,
    answer: { status: 200, schema: Spectrum },
  },

  {
    method: 'get',
    path: '/regions/:regionId/shells',
    summary: 'Shells of a region',
    answer: { status: 200, schema: listOf(Shell) },
  },
  {
    method: 'post',
    path: '/regions/:regionId/shells',
    summary: 'Name a shell',
    body: ShellDraft,
    answer: { status: 201, schema: Shell },
  },
  {
    method: 'get',
    path: '/shells',
    summary: 'The catalogue: filter, sort, page',
    query: CatalogueQuery,
    answer: { status: 200, schema: listOf(Shell) },
  },
  {
    method: 'get',
    path: '/shells.csv',
    summary: 'The catalogue as CSV',
    query: CatalogueQuery,
    answer: { status: 200, binary: 'text/csv' },
  },
  { method: 'get', path: '/shells/:shellId', summary: 'A shell', answer: { status: 200, schema: Shell } },
  {
    method: 'patch',
    path: '/shells/:shellId',
    summary: 'Rename, annotate, withdraw, adopt a fit',
    body: ShellChange,
    answer: { status: 200, schema: Shell },
  },
  {
    method: 'delete',
    path: '/shells/:shellId',
    summary: 'Take a shell out of the lists; can be undone',
    answer: { status: 204 },
  },
  {
    method: 'post',
    path: '/shells/:shellId/restore',
    summary: 'Undo taking a shell out',
    answer: { status: 200, schema: Shell },
  },

  {
    method: 'get',
    path: '/shells/:shellId/readings/mine',
    summary: 'My marks',
    answer: { status: 200, schema: Reading },
  },
  {
    method: 'put',
    path: '/shells/:shellId/readings/mine',
    summary: 'Save my marks; a stale revision answers 409 with both sides',
    body: ReadingDraft,
    answer: { status: 200, schema: Reading },
  },

  {
    method: 'get',
    path: '/shells/:shellId/fits',
    summary: 'Fits of record, newest first',
    answer: { status: 200, schema: listOf(Fit) },
  },
  {
    method: 'post',
    path: '/shells/:shellId/fits',
    summary: 'Freeze a reading and queue a fit',
    body: FitDraft,
    answer: { status: 202, schema: Fit },
  },
  { method: 'get', path: '/fits/:fitId', summary: 'A fit', answer: { status: 200, schema: Fit } },
  {
    method: 'get',
    path: '/fits/:fitId/marks',
    summary: 'The frozen marks of a fit',
    answer: { status: 200, schema: FrozenMarks },
  },
  {
    method: 'post',
    path: '/fits/:fitId/cancel',
    summary: 'Stop a fit',
    answer: { status: 202, schema: Fit },
  },
  {
    method: 'post',
    path: '/fits/:fitId/retry',
    summary: 'Run a failed or cancelled fit again',
    answer: { status: 202, schema: Fit },
  },

  {
    method: 'get',
    path: '/shells/:shellId/distances',
    summary: 'Distance entries, newest first; the newest one holds',
    answer: { status: 200, schema: listOf(Distance) },
  },
  {
    method: 'post',
    path: '/shells/:shellId/distances',
    summary: 'Enter a distance',
    body: DistanceDraft,
    answer: { status: 201, schema: Distance },
  },
];
