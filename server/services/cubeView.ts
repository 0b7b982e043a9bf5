import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import type { CubeHead } from '@/shared/fits/cubeHead';
import { applyOverrides } from '@/shared/fits/overrides';
import { footprintOf, overlaps as shareSky, type Footprint } from '@/shared/sky/footprint';
import { buildWcs } from '@/shared/sky/wcs';
import type { CubeRow } from '../store/cubes';
import { isoTime, isoTimeOrNull } from '../store/db';

/** The cube as it is to be understood: its header with what a person says beside it. */
export const understood = (row: CubeRow): CubeRow =>
  row.head && row.overrides ? { ...row, head: applyOverrides(row.head, row.overrides) } : row;

/** The cubes of one region as the API tells of them. */
export function toCubes(rows: readonly CubeRow[]): Cube[] {
  const all = rows.map(understood);
  const shown = all.map((row) => ({ id: row.id, name: row.name, print: footprint(row) }));
  return all.map((row, i) => toCube(row, overlapping(shown[i]!, shown)));
}

const toCube = (row: CubeRow, overlaps: Cube['overlaps']): Cube => ({
  id: row.id,
  regionId: row.regionId,
  name: row.name,
  fileName: row.fileName,
  sizeBytes: row.sizeBytes,
  checksum: row.checksum,
  status: row.status,
  progress: row.progress,
  activity: row.activity,
  problem: row.problem,
  axes: row.head && toAxes(row.head),
  cautions: row.head?.cautions ?? [],
  window: row.windowLow === null || row.windowHigh === null ? null : [row.windowLow, row.windowHigh],
  statistics: row.statistics,
  source: { hdu: row.sourceHdu ?? row.head?.hdu ?? 0, stokes: row.sourceStokes },
  choices: choicesOf(row.head),
  overrides:
    row.overrides && row.overriddenAt
      ? {
          values: row.overrides,
          by: row.overriddenById ? { id: row.overriddenById, name: row.overriddenByName ?? '' } : null,
          at: isoTime(row.overriddenAt),
        }
      : null,
  overlaps,
  createdBy: row.createdById ? { id: row.createdById, name: row.createdByName ?? '' } : null,
  createdAt: isoTime(row.createdAt),
  readyAt: isoTimeOrNull(row.readyAt),
});

const toAxes = (head: CubeHead): CubeAxes => ({
  ...head.shape,
  bitpix: head.bitpix,
  unit: head.unit ?? head.bunit,
  frame: head.frame,
  projection: head.projection,
  spectral: {
    type: head.spectral.type,
    convention: head.spectral.convention,
    frame: head.spectral.frame,
    restFrequencyHz: head.spectral.restFrequencyHz ?? head.spectral.assumedRestFrequencyHz,
    velocities: head.spectral.velocities,
    channelWidth: buildWcs(head.wcs).velocityStep,
  },
  beam: head.beam && {
    major: head.beam.majorDeg,
    minor: head.beam.minorDeg,
    angle: head.beam.positionAngleDeg,
  },
  wcs: { ...head.wcs },
});

interface Shown {
  id: string;
  name: string;
  print: Footprint | null;
}

const footprint = ({ head }: CubeRow): Footprint | null =>
  head && footprintOf(buildWcs(head.wcs), head.shape.nx, head.shape.ny);

const overlapping = (one: Shown, all: readonly Shown[]): Cube['overlaps'] =>
  all
    .filter(({ id, print }) => id !== one.id && one.print && print && shareSky(one.print, print))
    .map(({ id, name }) => ({ id, name }));

/** What else of the file could be read. Cubes read by an earlier version carry no list. */
export const choicesOf = (head: CubeHead | null): Cube['choices'] =>
  (head as { choices?: Cube['choices'] } | null)?.choices ?? { hdus: [], stokes: [] };
