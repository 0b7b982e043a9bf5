import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import { nudged, nudgeStep } from '@/components/cube/nudge';
import { degreesPerPixel } from '@/components/cube/Readout';
import { useSelection, type Selection } from '@/components/cube/useSelection';
import { degrees } from '@/components/cube/words';
import type { MapTool } from '@/components/map/gestures';
import type { SeenSky } from '@/components/seeing/useSeenSky';
import { count } from '@/components/ui/format';
import { newMarkId, type MarkSaid, type PlacedMark } from '@/hooks/reading/placedMark';
import type { ReadingAction } from '@/hooks/reading/readingState';
import { valueStore, type ValueStore } from '@/hooks/valueStore';
import type { CubeAxes } from '@/shared/contract/cubes';
import { inPolygon } from '@/shared/image/polygon';
import { within, type ImagePoint } from '@/shared/image/viewport';
import { PIXELS_A_BEAM } from '@/shared/shell/assumedBeam';
import type { Wcs } from '@/shared/sky/wcs';

export interface Marking extends Selection {
  /** The tool a person took; what counts on the map is `marking`. */
  tool: MapTool;
  setTool: (tool: MapTool) => void;
  /** What was done, for who does not see the map. */
  said: ValueStore<string>;
  /** Half the beam, degrees: the error a mark begins with. Where the header names no beam, three pixels are taken for it. */
  usualSigma: number;
  placeMark: (at: ImagePoint, by?: 'pointer' | 'keys') => void;
  /** Several at once, as one step of undo. Places outside the image are left out. */
  addMarks: (at: readonly (ImagePoint & { sigma?: number })[], placed: 'suggested' | 'ring') => void;
  /** Moves all selected marks when it is one of them. */
  moveMark: (id: string, at: ImagePoint, gesture: string) => void;
  /** By an arrow key, along the picture shown. */
  nudge: (right: number, up: number, far: boolean, seen: Pick<SeenSky, 'fromImage' | 'toImage'>) => void;
  lasso: (line: readonly ImagePoint[]) => void;
  removeMarks: (ids: readonly string[]) => void;
  describeMarks: (ids: readonly string[], said: MarkSaid, gesture?: string) => void;
}

interface Input {
  axes: CubeAxes;
  wcs: Wcs;
  /** The channel shown; null while a map of all channels is. */
  channel: number | null;
  marks: readonly PlacedMark[];
  dispatch: (action: ReadingAction) => void;
}

/** Nudges this close together are one step of undo. */
const ONE_STEP_MS = 800;

/** All that can be done to marks, whichever hand does it: map, list and keys call the same. */
export function useMarking(input: Input): Marking {
  const { axes, wcs, channel, marks, dispatch } = input;
  const [tool, setTool] = useState<MapTool>('mark');
  const [said] = useState(() => valueStore(''));
  const selection = useSelection(marks, channel);
  const { chosen, select, selectMany } = selection;
  const usualSigma = useMemo(
    () => fourDigits(axes.beam ? axes.beam.major / 2 : 0.5 * PIXELS_A_BEAM * degreesPerPixel(axes, wcs)),
    [axes, wcs],
  );
  const burst = useRef({ name: '', time: 0 });
  const here = useRef({ ...input, chosen });
  useEffect(() => {
    here.current = { ...input, chosen };
  });

  const placeMark = useCallback(
    (at: ImagePoint, by: 'pointer' | 'keys' = 'pointer') => {
      const now = here.current;
      if (now.channel === null) return;
      const mark = { ...newMark(at, now.channel, usualSigma), placed: 'hand' as const };
      dispatch({ type: 'add', marks: [mark] });
      // By keys the crosshair goes on to the next place; a mark in hand would take the arrows for itself.
      select(by === 'pointer' ? mark.id : null);
      const sky = wcs.pixelToGalactic(mark.x, mark.y);
      const own = now.marks.filter((m) => m.channel === now.channel).length + 1;
      const place = sky ? ` at l ${degrees(sky.l, 2)}, b ${degrees(sky.b, 2)}` : '';
      said.set(`Mark placed${place}; ${count(own, 'mark')} on this channel.`);
    },
    [dispatch, select, said, usualSigma, wcs],
  );
  const addMarks = useCallback<Marking['addMarks']>(
    (places, how) => {
      const now = here.current;
      const { channel: k } = now;
      if (k === null) return;
      const inside = places.filter((p) => {
        const q = within(now.axes, p);
        return q.x === p.x && q.y === p.y;
      });
      const added = inside.map((p) => ({ ...newMark(p, k, p.sigma ?? usualSigma), placed: how }));
      dispatch({ type: 'add', marks: added });
      said.set(`${count(added.length, 'mark')} placed.`);
    },
    [dispatch, said, usualSigma],
  );
  const moveTo = useCallback(
    (moved: readonly PlacedMark[], where: (mark: PlacedMark) => ImagePoint, gesture: string) => {
      const to = moved.map((m) => {
        const at = within(here.current.axes, where(m));
        return { id: m.id, x: round(at.x), y: round(at.y) };
      });
      dispatch({ type: 'move', to, gesture });
    },
    [dispatch],
  );
  const moveMark = useCallback(
    (id: string, at: ImagePoint, gesture: string) => {
      const { marks: all, chosen: many } = here.current;
      const mark = all.find((m) => m.id === id);
      if (!mark) return;
      const [dx, dy] = [at.x - mark.x, at.y - mark.y];
      const moved = many.some((m) => m.id === id) ? many : [mark];
      moveTo(moved, (m) => ({ x: m.x + dx, y: m.y + dy }), gesture);
    },
    [moveTo],
  );
  const nudge = useCallback<Marking['nudge']>(
    (right, up, far, seen) => {
      const { chosen: many, axes: image } = here.current;
      const now = performance.now();
      const who = many.map((m) => m.id).join();
      const again = burst.current.name.startsWith(who) && now - burst.current.time < ONE_STEP_MS;
      burst.current = { name: again ? burst.current.name : `${who} ${now}`, time: now };
      const step = nudgeStep(image, wcs, far);
      moveTo(many, (m) => nudged(m, [right, up], step, seen), `nudge ${burst.current.name}`);
      said.set(`${count(many.length, 'mark')} moved.`);
    },
    [moveTo, said, wcs],
  );
  const lasso = useCallback(
    (line: readonly ImagePoint[]) => {
      const { marks: all, channel: k } = here.current;
      const inside = all.filter((m) => m.channel === k && inPolygon(line, m));
      selectMany(inside.map((m) => m.id));
      said.set(`${count(inside.length, 'mark')} selected.`);
    },
    [selectMany, said],
  );
  const removeMarks = useCallback(
    (ids: readonly string[]) => {
      dispatch({ type: 'remove', ids });
      said.set(`${count(ids.length, 'mark')} deleted.`);
    },
    [dispatch, said],
  );
  const describeMarks = useCallback<Marking['describeMarks']>(
    (ids, what, gesture) => dispatch({ type: 'describe', ids, said: what, gesture: gesture ?? null }),
    [dispatch],
  );
  return {
    ...selection,
    tool,
    setTool,
    said,
    usualSigma,
    placeMark,
    addMarks,
    moveMark,
    nudge,
    lasso,
    removeMarks,
    describeMarks,
  };
}

const newMark = (at: ImagePoint, channel: number, sigma: number) => ({
  id: newMarkId(),
  channel,
  x: round(at.x),
  y: round(at.y),
  sigma,
});

/** A thousandth of a pixel is finer than any hand. */
const round = (pixel: number) => Math.round(pixel * 1000) / 1000;
const fourDigits = (value: number) => Number(value.toPrecision(4));
