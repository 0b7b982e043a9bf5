import type { CubePlace } from '@/components/cube/place';
import type { LookControl } from '@/components/cube/useLook';
import type { ShownModel } from '@/components/cube/useModel';
import type { Marking } from '@/components/cube/useMarking';
import type { RingTool } from '@/components/cube/useRingTool';
import type { Suggestions } from '@/components/cube/useSuggestions';
import type { TrialModel } from '@/components/cube/useTrial';
import type { View } from '@/components/cube/views';
import type { MapTool } from '@/components/map/gestures';
import type { MapStore } from '@/components/map/mapStore';
import type { Scene } from '@/components/map/scene';
import type { ToolScene } from '@/components/map/toolScene';
import type { Contours } from '@/components/seeing/useContours';
import type { Layers } from '@/components/seeing/useLayers';
import type { Film } from '@/components/seeing/useFilm';
import type { Coordinates } from '@/components/seeing/useCoordinates';
import type { SeenPicture } from '@/components/seeing/useSeenPicture';
import type { StripOrder } from '@/components/strip/stripOrder';
import type { PlacedMark } from '@/hooks/reading/placedMark';
import type { LiveFit } from '@/hooks/reading/useLiveFit';
import type { ReadingSession } from '@/hooks/reading/useReading';
import type { List, Read } from '@/hooks/useRead';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import type { Shell } from '@/shared/contract/shells';
import type { NextChannel } from '@/shared/shell/suggest/whereNext';
import type { Wcs } from '@/shared/sky/wcs';

/** Everything the cube screen's parts share. */
export interface CubeSession extends ShownModel, SeenPicture, Marking, Suggestions, TrialModel {
  cube: Cube;
  axes: CubeAxes;
  wcs: Wcs;
  order: StripOrder;
  channel: number;
  velocity: number;
  /** A channel, or a map of all of them. */
  view: View;
  setView: (view: View) => void;
  channelLook: LookControl;
  /** Of the numbers shown now. */
  unit: string | null;
  coordinates: Coordinates;
  contours: Contours;
  layers: Layers;
  film: Film;
  store: MapStore;
  scene: Scene;
  start: CubePlace;
  shells: Read<List<Shell>>;
  shell: Shell | null;
  chooseShell: (id: string | null) => void;
  /** The role allows marking at all. */
  mayMark: boolean;
  /** Marks can be placed now. */
  canMark: boolean;
  /** What a press on the map is for just now. */
  mapTool: MapTool;
  tools: ToolScene;
  ring: RingTool;
  takeGhosts: (ids: readonly string[]) => void;
  /** The channels where a ring would tell most, best first. */
  next: readonly NextChannel[];
  reading: ReadingSession;
  /** My marks of the shell lie on another cube. */
  elsewhere: string | null;
  marks: readonly PlacedMark[];
  marksByChannel: ReadonlyMap<number, number>;
  live: LiveFit;
  /** I have a reading of this shell on this cube, or can begin one. */
  hasReading: boolean;
  showChannel: (channel: number) => void;
  stepChannel: (steps: number) => void;
  /** Show a place: its channel, with the mark there selected, and in sight. */
  showPlace: (at: { channel: number; x: number; y: number }) => void;
}
