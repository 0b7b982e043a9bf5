import type { CubePlace } from '@/components/cube/place';
import type { LookControl } from '@/components/cube/useLook';
import type { ShownModel } from '@/components/cube/useModel';
import type { View } from '@/components/cube/views';
import type { MapStore } from '@/components/map/mapStore';
import type { Scene } from '@/components/map/scene';
import type { StripOrder } from '@/components/strip/stripOrder';
import type { Planes } from '@/hooks/planes/usePlanes';
import type { PlacedMark } from '@/hooks/reading/placedMark';
import type { LiveFit } from '@/hooks/reading/useLiveFit';
import type { ReadingSession } from '@/hooks/reading/useReading';
import type { List, Read } from '@/hooks/useRead';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import type { Shell } from '@/shared/contract/shells';
import type { ImagePoint } from '@/shared/image/viewport';
import type { Wcs } from '@/shared/sky/wcs';

export type Grid = 'galactic' | 'own' | 'off';

/** Everything the cube screen's parts share. */
export interface CubeSession extends ShownModel {
  cube: Cube;
  axes: CubeAxes;
  wcs: Wcs;
  order: StripOrder;
  channel: number;
  velocity: number;
  /** A channel, or a map of all of them. */
  view: View;
  setView: (view: View) => void;
  /** Of what is shown now; the channels' own stays while a map is. */
  look: LookControl;
  channelLook: LookControl;
  /** Of the numbers shown now. */
  unit: string | null;
  grid: Grid;
  setGrid: (grid: Grid) => void;
  planes: Planes;
  store: MapStore;
  scene: Scene;
  start: CubePlace;
  shells: Read<List<Shell>>;
  shell: Shell | null;
  chooseShell: (id: string | null) => void;
  /** The role allows marking at all. */
  mayMark: boolean;
  /** Marks can be placed now. */
  marking: boolean;
  markMode: boolean;
  setMarkMode: (on: boolean) => void;
  reading: ReadingSession;
  /** My marks of the shell lie on another cube. */
  elsewhere: string | null;
  marks: readonly PlacedMark[];
  marksByChannel: ReadonlyMap<number, number>;
  live: LiveFit;
  /** I have a reading of this shell on this cube, or can begin one. */
  hasReading: boolean;
  selected: PlacedMark | null;
  select: (id: string | null) => void;
  showChannel: (channel: number) => void;
  stepChannel: (steps: number) => void;
  placeMark: (at: ImagePoint) => void;
  moveMark: (id: string, at: ImagePoint, gesture: string) => void;
  removeMarks: (ids: readonly string[]) => void;
  /** Show a place: its channel, with the mark there selected, and in sight. */
  showPlace: (at: { channel: number; x: number; y: number }) => void;
}
