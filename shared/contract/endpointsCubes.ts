import { listOf } from './common';
import {
  ChannelList,
  Cube,
  CubeChange,
  CubeHeader,
  CubeOverrides,
  CubeSource,
  CutQuery,
  PlaneQuery,
  Spectrum,
  SpectrumQuery,
  UploadState,
} from './cubes';
import type { Endpoint } from './endpoint';

export const CUBE_ENDPOINTS: readonly Endpoint[] = [
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
      'A channel as little-endian unsigned 16-bit (or 8-bit) numbers, row y = 0 first: brightness = Plane-Offset + Plane-Scale × number, Plane-Blank where there is none; error at most half of Plane-Scale',
    query: PlaneQuery,
    answer: { status: 200, binary: 'application/octet-stream' },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/maps/:kind',
    summary:
      'A map over all channels, in the form of a plane: total (sum times the channel width), velocity and dispersion (weighted by brightness, above a mask that Plane-Mask states), peak',
    answer: { status: 200, binary: 'application/octet-stream' },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/cut',
    summary:
      'Position against velocity along a great-circle segment or around a ring, in the form of a plane: places across, at most one pixel and Cut-Step degrees apart; channels upward',
    query: CutQuery,
    answer: { status: 200, binary: 'application/octet-stream' },
  },
  {
    method: 'patch',
    path: '/cubes/:cubeId/overrides',
    summary: 'Say what the header does not, or says wrong',
    body: CubeOverrides,
    answer: { status: 200, schema: Cube },
  },
  {
    method: 'patch',
    path: '/cubes/:cubeId/source',
    summary: 'Choose another image or Stokes plane of the file; it is read again',
    body: CubeSource,
    answer: { status: 202, schema: Cube },
  },
  {
    method: 'get',
    path: '/cubes/:cubeId/spectrum',
    summary: 'Spectrum of the cube, or the mean over a disc or ring about a pixel',
    query: SpectrumQuery,
    answer: { status: 200, schema: Spectrum },
  },
];
