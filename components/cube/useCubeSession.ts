import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type { CubeSession, Grid } from '@/components/cube/cubeSession';
import type { CubePlace } from '@/components/cube/place';
import { useLook } from '@/components/cube/useLook';
import { useAddress } from '@/components/cube/usePlace';
import { useModel } from '@/components/cube/useModel';
import { useScene } from '@/components/cube/useScene';
import { useView } from '@/components/cube/useView';
import { unitOf } from '@/components/cube/views';
import { mapStore } from '@/components/map/mapStore';
import { stepped, stripOrder } from '@/components/strip/stripOrder';
import { newMarkId } from '@/hooks/reading/placedMark';
import { useLiveFit } from '@/hooks/reading/useLiveFit';
import { useReading } from '@/hooks/reading/useReading';
import { usePlanes } from '@/hooks/planes/usePlanes';
import { useMay, useMe } from '@/hooks/useMe';
import { useShells } from '@/hooks/useShells';
import { useValue } from '@/hooks/valueStore';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import { clamped, within, type ImagePoint, type Viewport } from '@/shared/image/viewport';
import type { Wcs } from '@/shared/sky/wcs';

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
  const channelLook = useLook(start, cube.window ?? [0, 1]);
  const shownView = useView(cube, start.map, channelLook);
  const { view, setView } = shownView;
  const onMap = view !== 'channel';
  const look = shownView.look ?? channelLook;

  const shell = shells.data?.items.find((s) => s.id === shellId) ?? null;
  const mayMark = may('reading.write');
  const reading = useReading(shell && mayMark ? shell.id : null, cube.id, me?.id ?? null);
  const { dispatch, state } = reading;
  const elsewhere =
    state.cubeId !== null && state.cubeId !== cube.id && state.marks.length > 0 ? state.cubeId : null;
  const marks = useMemo(() => (elsewhere ? [] : state.marks), [elsewhere, state.marks]);
  const marking =
    shell !== null && mayMark && state.ready && !elsewhere && !state.conflict && markMode && !onMap;

  const velocities = axes.spectral.velocities;
  const range = useMemo(() => [velocities[0], velocities[1]] as const, [velocities]);
  const live = useLiveFit(marks, wcs, axes.spectral.channelWidth, range);
  const shown = useModel(shell, live, mayMark, state.readingId);
  const { model } = shown;

  const image = useMemo(() => ({ nx: axes.nx, ny: axes.ny, channels: axes.channels }), [axes]);
  const channelPlanes = usePlanes(cube, image, channel, useValue(store.viewport, sharpness));
  const planes = onMap ? shownView.planes : channelPlanes;
  const selected = (!onMap && marks.find((m) => m.id === selectedId && m.channel === channel)) || null;
  const scene = useScene({
    wcs,
    image,
    order,
    channel,
    channelWidth: axes.spectral.channelWidth,
    allChannels: onMap,
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

  const showChannel = useCallback(
    (to: number) => {
      performance.mark?.('outswell:channel-asked', { detail: { channel: to } });
      setChannel(to);
      setView('channel'); // who moves along the strip wants to see channels
    },
    [setView],
  );
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
      map: view === 'channel' ? null : view,
      palette: channelLook.palette === 'Ink' ? null : channelLook.palette,
      tone: channelLook.tone === 'arcsinh' ? null : channelLook.tone,
      window: channelLook.usual ? null : channelLook.window,
    }),
    [channel, shellId, markNumber, view, channelLook],
  );
  useAddress(place, store);

  return {
    cube,
    axes,
    wcs,
    order,
    channel,
    velocity: wcs.velocityOf(channel),
    view,
    setView,
    look,
    channelLook,
    unit: unitOf(view, axes.unit),
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
