import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type { CubeSession } from '@/components/cube/cubeSession';
import type { CubePlace } from '@/components/cube/place';
import { useLook } from '@/components/cube/useLook';
import { useAddress } from '@/components/cube/usePlace';
import { firstGuess } from '@/components/cube/firstGuess';
import { useMarking } from '@/components/cube/useMarking';
import { useModel } from '@/components/cube/useModel';
import { useRingTool } from '@/components/cube/useRingTool';
import { useSuggestions } from '@/components/cube/useSuggestions';
import { useTrial } from '@/components/cube/useTrial';
import { useWhereNext } from '@/components/cube/useWhereNext';
import { useScene, type SceneModel } from '@/components/cube/useScene';
import { useView } from '@/components/cube/useView';
import { useContours } from '@/components/seeing/useContours';
import { useLayers } from '@/components/seeing/useLayers';
import { useFilm } from '@/components/seeing/useFilm';
import { useCoordinates } from '@/components/seeing/useCoordinates';
import { useSeenPicture } from '@/components/seeing/useSeenPicture';
import { unitOf } from '@/components/cube/views';
import type { MapTool } from '@/components/map/gestures';
import { mapStore } from '@/components/map/mapStore';
import type { ToolScene } from '@/components/map/toolScene';
import { stepped, stripOrder } from '@/components/strip/stripOrder';
import { useLiveFit } from '@/hooks/reading/useLiveFit';
import { useReading } from '@/hooks/reading/useReading';
import { useMay, useMe } from '@/hooks/useMe';
import { useShells } from '@/hooks/useShells';
import type { Cube, CubeAxes } from '@/shared/contract/cubes';
import type { Shell } from '@/shared/contract/shells';
import { clamped, type ImagePoint, type Viewport } from '@/shared/image/viewport';
import { modelRadius } from '@/shared/shell/channelCurve';
import type { Wcs } from '@/shared/sky/wcs';

const NO_SHELLS: readonly Shell[] = [];

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
  const coordinates = useCoordinates();
  const channelLook = useLook(start, cube.window ?? [0, 1]);
  const shownView = useView(cube, start.map);
  const { view, setView } = shownView;
  const onMap = view !== 'channel';

  const shell = shells.data?.items.find((s) => s.id === shellId) ?? null;
  const mayMark = may('reading.write');
  const reading = useReading(shell && mayMark ? shell.id : null, cube.id, me?.id ?? null);
  const { dispatch, state } = reading;
  const elsewhere =
    state.cubeId !== null && state.cubeId !== cube.id && state.marks.length > 0 ? state.cubeId : null;
  const marks = useMemo(() => (elsewhere ? [] : state.marks), [elsewhere, state.marks]);
  const marking = useMarking({ axes, wcs, channel: onMap ? null : channel, marks, dispatch });
  const { chosen, selected, select, tool, usualSigma, addMarks } = marking;
  const canMark = shell !== null && mayMark && state.ready && !elsewhere && !state.conflict && !onMap;
  const mapTool: MapTool = canMark ? tool : 'move';

  const guess = useRef<() => SceneModel>(() => firstGuess(axes, wcs, [], null));
  const trialModel = useTrial(useCallback(() => guess.current(), []));
  const live = useLiveFit(marks, wcs, axes.spectral.channelWidth, trialModel.fitStart);
  const shown = useModel(shell, live, mayMark, state.readingId, trialModel.trial);
  const { model } = shown;
  useEffect(() => {
    guess.current = () => firstGuess(axes, wcs, live.readings, model);
  });
  const next = useWhereNext(live, axes, wcs, usualSigma);

  const image = useMemo(() => ({ nx: axes.nx, ny: axes.ny, channels: axes.channels }), [axes]);
  const seenPicture = useSeenPicture({
    cube,
    axes,
    wcs,
    order,
    channel,
    shownView,
    channelLook,
    model,
    start: start.seeing,
    store,
  });
  const { seeing, seen, channelPlanes, ahead } = seenPicture;
  const contours = useContours(seeing.contours, seen);
  const own = live.readings.find((r) => r.channel === channel)?.ring ?? null;
  const suggestions = useSuggestions({
    plane:
      canMark && channelPlanes.plane?.channel === channel && !channelPlanes.plane.standIn
        ? channelPlanes.plane
        : null,
    axes,
    wcs,
    marks,
    readings: live.readings,
  });
  const { ghosts } = suggestions;
  const ring = useRingTool({
    active: mapTool === 'ring',
    store,
    axes,
    wcs,
    seen,
    expected:
      own?.theta ?? (model && modelRadius(wcs.velocityOf(channel), axes.spectral.channelWidth, model)),
    usualSigma,
    addMarks,
    say: marking.said.set,
  });
  const { onMap: ringOnMap } = ring;
  const stored = state.conflict?.marks;
  const tools = useMemo<ToolScene>(
    () => ({
      ghosts: ghosts.flatMap((ghost) => {
        const at = seen.fromImage(ghost);
        return at ? [{ ...at, id: ghost.id }] : [];
      }),
      others: stored?.flatMap((m) => (m.channel === channel ? (seen.fromImage(m) ?? []) : [])) ?? [],
      ring: ringOnMap,
    }),
    [ghosts, stored, channel, ringOnMap, seen],
  );
  const takeGhosts = useCallback(
    (ids: readonly string[]) =>
      addMarks(
        ghosts.filter((ghost) => ids.includes(ghost.id)),
        'suggested',
      ),
    [ghosts, addMarks],
  );
  const layers = useLayers({
    cubeId: cube.id,
    shell,
    shells: shells.data?.items ?? NO_SHELLS,
    seen,
    channel,
    velocity: wcs.velocityOf(channel),
    channelWidth: axes.spectral.channelWidth,
    allChannels: onMap,
    mayMark,
    readingId: state.readingId,
    choice: seeing,
  });
  const scene = useScene({
    seen,
    frame: axes.frame,
    velocityOf: wcs.velocityOf,
    order,
    channel,
    channelWidth: axes.spectral.channelWidth,
    allChannels: onMap,
    marks,
    selected: chosen,
    readings: live.readings,
    model,
    beam: axes.beam,
    grid: coordinates.grid,
    notation: coordinates.notation,
    distancePc: shell?.adopted?.distance?.pc ?? null,
    contours: contours.lines,
    layers: layers.drawn,
  });
  const marksByChannel = useMemo(() => {
    const counts = new Map<number, number>();
    for (const mark of marks) counts.set(mark.channel, (counts.get(mark.channel) ?? 0) + 1);
    return counts;
  }, [marks]);

  const showChannel = useCallback(
    (to: number) => {
      performance.mark?.('outswell:channel-asked', { detail: { channel: to } });
      const plane = onMap ? null : ahead(to);
      if (plane) store.early.set(plane); // seen before the page has followed
      setChannel(to);
      setView('channel'); // who moves along the strip wants to see channels
    },
    [setView, ahead, store, onMap],
  );
  const film = useFilm(order, channel, showChannel, model);
  const here = useRef({ channel, marks, order, image, store });
  useEffect(() => {
    here.current = { channel, marks, order, image, store };
  });
  const stepChannel = useCallback(
    (steps: number) => showChannel(stepped(here.current.order, here.current.channel, steps)),
    [showChannel],
  );
  const showPlace = useCallback(
    (at: { channel: number; x: number; y: number }) => {
      showChannel(at.channel);
      const found = here.current.marks.find(
        (m) => m.channel === at.channel && Math.hypot(m.x - at.x, m.y - at.y) < 1e-6,
      );
      select(found?.id ?? null);
      const v = here.current.store.viewport.get();
      if (v && !found) here.current.store.hover.set(at);
      if (v && !isSeen(v, at)) here.current.store.viewport.set(clamped({ ...v, x: at.x, y: at.y }));
    },
    [showChannel, select],
  );
  const chooseShell = useCallback(
    (id: string | null) => {
      setShellId(id);
      select(null);
    },
    [select],
  );

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
      seeing,
    }),
    [channel, shellId, markNumber, view, channelLook, seeing],
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
    channelLook,
    unit: unitOf(view, axes.unit),
    coordinates,
    contours,
    layers,
    film,
    ...seenPicture,
    store,
    scene,
    start,
    shells,
    shell,
    chooseShell,
    mayMark,
    canMark,
    mapTool,
    tools,
    ring,
    takeGhosts,
    next,
    reading,
    elsewhere,
    marks,
    marksByChannel,
    live,
    hasReading: shell !== null && mayMark && !elsewhere,
    ...shown,
    ...marking,
    ...suggestions,
    ...trialModel,
    showChannel,
    stepChannel,
    showPlace,
  };
}

const isSeen = (v: Viewport, { x, y }: ImagePoint): boolean =>
  Math.abs(x - v.x) * v.scale < v.width / 2 - 20 && Math.abs(y - v.y) * v.scale < v.height / 2 - 20;
