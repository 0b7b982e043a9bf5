import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type { CubePlace } from '@/components/cube/place';
import { useLook, type LookControl } from '@/components/cube/useLook';
import { useAddress } from '@/components/cube/usePlace';
import { useModel, type ShownModel } from '@/components/cube/useModel';
import { useScene } from '@/components/cube/useScene';
import { mapStore, type MapStore } from '@/components/map/mapStore';
import type { Scene } from '@/components/map/scene';
import { stepped, stripOrder, type StripOrder } from '@/components/strip/stripOrder';
import { newMarkId, type PlacedMark } from '@/hooks/reading/placedMark';
import { useLiveFit, type LiveFit } from '@/hooks/reading/useLiveFit';
import { useReading, type ReadingSession } from '@/hooks/reading/useReading';
import { usePlanes, type Planes } from '@/hooks/planes/usePlanes';
import { useMay, useMe } from '@/hooks/useMe';
import { useShells } from '@/hooks/useShells';
import type { List, Read } from '@/hooks/useRead';
import { useValue } from '@/hooks/valueStore';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import type { Shell } from '@/shared/contract/shells';
import { clamped, within, type ImagePoint, type Viewport } from '@/shared/image/viewport';
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
  look: LookControl;
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

/** How sharp a plane is wanted, in steps of two so that zooming asks rarely. */
const sharpness = (v: Viewport | null): number =>
  v ? 2 ** Math.ceil(Math.log2(Math.max(v.nx, v.ny) * v.scale * (globalThis.devicePixelRatio || 1))) : 512;

export function useCubeSession(cube: Cube, axes: CubeAxes, wcs: Wcs, start: CubePlace): CubeSession {
  const { data: me } = useMe();
  const may = useMay();
  const shells = useShells(cube.regionId);
  const [store] = useState(mapStore);
  const order = useMemo(
    () => stripOrder(Array.from({ length: axes.channels }, (_, k) => wcs.velocityOf(k))),
    [axes.channels, wcs],
  );

  const [asked, setChannel] = useState<number | null>(start.channel);
  const channel = Math.min(asked ?? order.channels[axes.channels >> 1] ?? 0, axes.channels - 1);
  const [shellId, setShellId] = useState<string | null>(start.shell);
  const [selectedId, setSelected] = useState<string | null>(null);
  const [markMode, setMarkMode] = useState(true);
  const [grid, setGrid] = useState<Grid>('galactic');
  const look = useLook(start, cube.window ?? [0, 1]);

  const shell = shells.data?.items.find((s) => s.id === shellId) ?? null;
  const mayMark = may('reading.write');
  const reading = useReading(shell && mayMark ? shell.id : null, cube.id, me?.id ?? null);
  const { dispatch, state } = reading;
  const elsewhere =
    state.cubeId !== null && state.cubeId !== cube.id && state.marks.length > 0 ? state.cubeId : null;
  const marks = useMemo(() => (elsewhere ? [] : state.marks), [elsewhere, state.marks]);
  const marking = shell !== null && mayMark && state.ready && !elsewhere && !state.conflict && markMode;

  const velocities = axes.spectral.velocities;
  const range = useMemo(() => [velocities[0], velocities[1]] as const, [velocities]);
  const live = useLiveFit(marks, wcs, axes.spectral.channelWidth, range);
  const shown = useModel(shell, live, mayMark, state.readingId);
  const { model } = shown;

  const image = useMemo(() => ({ nx: axes.nx, ny: axes.ny, channels: axes.channels }), [axes]);
  const planes = usePlanes(cube, image, channel, useValue(store.viewport, sharpness));
  const selected = marks.find((m) => m.id === selectedId && m.channel === channel) ?? null;
  const scene = useScene({
    wcs,
    image,
    order,
    channel,
    channelWidth: axes.spectral.channelWidth,
    marks,
    selected: selected?.id ?? null,
    readings: live.readings,
    model,
    beam: axes.beam,
    grid,
  });
  const marksByChannel = useMemo(() => {
    const counts = new Map<number, number>();
    for (const mark of marks) counts.set(mark.channel, (counts.get(mark.channel) ?? 0) + 1);
    return counts;
  }, [marks]);

  const showChannel = useCallback((to: number) => {
    performance.mark?.('outswell:channel-asked', { detail: { channel: to } });
    setChannel(to);
  }, []);
  const here = useRef({ channel, marks, order, image, store });
  useEffect(() => {
    here.current = { channel, marks, order, image, store };
  });
  const stepChannel = useCallback(
    (steps: number) => showChannel(stepped(here.current.order, here.current.channel, steps)),
    [showChannel],
  );
  const placeMark = useCallback(
    (at: ImagePoint) => {
      const mark = { id: newMarkId(), channel: here.current.channel, x: round(at.x), y: round(at.y) };
      dispatch({ type: 'add', mark });
      setSelected(mark.id);
    },
    [dispatch],
  );
  const moveMark = useCallback(
    (id: string, at: ImagePoint, gesture: string) => {
      const inside = within(here.current.image, at);
      dispatch({ type: 'move', id, x: round(inside.x), y: round(inside.y), gesture });
    },
    [dispatch],
  );
  const removeMarks = useCallback((ids: readonly string[]) => dispatch({ type: 'remove', ids }), [dispatch]);
  const showPlace = useCallback(
    (at: { channel: number; x: number; y: number }) => {
      showChannel(at.channel);
      const found = here.current.marks.find(
        (m) => m.channel === at.channel && Math.hypot(m.x - at.x, m.y - at.y) < 1e-6,
      );
      setSelected(found?.id ?? null);
      const v = here.current.store.viewport.get();
      if (v && !found) here.current.store.hover.set(at);
      if (v && !isSeen(v, at)) here.current.store.viewport.set(clamped({ ...v, x: at.x, y: at.y }));
    },
    [showChannel],
  );
  const chooseShell = useCallback((id: string | null) => {
    setShellId(id);
    setSelected(null);
  }, []);

  // A link to a mark: once the marks are here, go to it.
  const pending = useRef(start.mark);
  useEffect(() => {
    if (pending.current === null || !state.ready) return;
    const mark = marks[pending.current];
    pending.current = null;
    if (mark) showPlace(mark);
  }, [state.ready, marks, showPlace]);

  const markNumber = selected ? marks.indexOf(selected) : -1;
  const place = useMemo(
    () => ({
      channel,
      shell: shellId,
      mark: markNumber < 0 ? null : markNumber,
      palette: look.palette === 'Ink' ? null : look.palette,
      tone: look.tone === 'arcsinh' ? null : look.tone,
      window: look.usual ? null : look.window,
    }),
    [channel, shellId, markNumber, look],
  );
  useAddress(place, store);

  return {
    cube,
    axes,
    wcs,
    order,
    channel,
    velocity: wcs.velocityOf(channel),
    look,
    grid,
    setGrid,
    planes,
    store,
    scene,
    start,
    shells,
    shell,
    chooseShell,
    mayMark,
    marking,
    markMode,
    setMarkMode,
    reading,
    elsewhere,
    marks,
    marksByChannel,
    live,
    hasReading: shell !== null && mayMark && !elsewhere,
    ...shown,
    selected,
    select: setSelected,
    showChannel,
    stepChannel,
    placeMark,
    moveMark,
    removeMarks,
    showPlace,
  };
}

/** A thousandth of a pixel is finer than any hand. */
const round = (pixel: number) => Math.round(pixel * 1000) / 1000;

const isSeen = (v: Viewport, { x, y }: ImagePoint): boolean =>
  Math.abs(x - v.x) * v.scale < v.width / 2 - 20 && Math.abs(y - v.y) * v.scale < v.height / 2 - 20;
