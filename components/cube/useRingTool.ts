import { useCallback, useEffect, useMemo, useRef } from 'react';
import { nudgeStep } from '@/components/cube/nudge';
import { ringKey } from '@/components/cube/ringKeys';
import { degreesPerPixel } from '@/components/cube/Readout';
import type { SeenSky } from '@/components/seeing/useSeenSky';
import type { MapStore } from '@/components/map/mapStore';
import type { Phase } from '@/components/map/gestures';
import type { RingOnMap } from '@/components/map/toolScene';
import type { CubeAxes } from '@/shared/contract/cubes';
import { pathThrough } from '@/shared/image/skyPath';
import type { ImagePoint } from '@/shared/image/viewport';
import {
  ringPlaces,
  ringThrough,
  sectorAt,
  sigmaFactor,
  SECTORS,
  withErased,
  withTheta,
  type RingDraft,
} from '@/shared/shell/suggest/ringDraft';
import { destination, positionAngle, type LonLat } from '@/shared/sky/greatCircle';
import type { Wcs } from '@/shared/sky/wcs';

export interface RingTool {
  onRing: (phase: Phase, at: ImagePoint, reach: number) => void;
  onRingKey: (key: string, shift: boolean) => boolean;
  onMap: (draft: RingDraft) => RingOnMap;
  change: (by: (draft: RingDraft) => RingDraft) => void;
  confirm: () => void;
  drop: () => void;
}

interface Input {
  active: boolean;
  store: MapStore;
  axes: CubeAxes;
  wcs: Wcs;
  /** How the picture shown lies on the sky: the circle is drawn on that, its marks go on the cube's image. */
  seen: Pick<SeenSky, 'sky' | 'nx' | 'ny'>;
  /** What a ring begun by keys is as wide as, degrees: the ring or the model seen here; null where there is none. */
  expected: number | null;
  /** Of one mark by hand, degrees. */
  usualSigma: number;
  addMarks: (at: readonly (ImagePoint & { sigma: number })[], placed: 'ring') => void;
  say: (what: string) => void;
}

type Grip = 'new' | 'centre' | 'rim' | { erase: boolean; from: number };
/** An arrow key moves the circle by this many tenths of the beam. */
const KEY_STEPS = 3;

/** The circle that becomes marks: drawn from its centre to its rim, adjusted by its handles, parts of it erased. */
export function useRingTool(input: Input): RingTool {
  const { store, axes, wcs, seen } = input;
  const { sky, nx, ny } = seen;
  const latest = useRef(input);
  useEffect(() => {
    latest.current = input;
  });
  const held = useRef<{ grip: Grip; before: RingDraft | null }>({ grip: 'new', before: null });

  const galactic = useCallback(
    ({ x, y }: ImagePoint): LonLat | null => {
      const at = sky.pixelToGalactic(x, y);
      return at && { lon: at.l, lat: at.b };
    },
    [sky],
  );
  const project = useCallback(({ lon, lat }: LonLat) => sky.galacticToPixel(lon, lat), [sky]);

  const gripAt = useCallback(
    (draft: RingDraft | null, at: ImagePoint, place: LonLat, reach: number): Grip => {
      const near = (to: ImagePoint | null, within: number) =>
        to !== null && Math.hypot(to.x - at.x, to.y - at.y) <= within;
      if (!draft) return 'new';
      if (near(project(destination(draft.centre, draft.handle, draft.theta)), reach)) return 'rim';
      if (near(project(draft.centre), reach)) return 'centre';
      const angle = positionAngle(draft.centre, place);
      if (!near(project(destination(draft.centre, angle, draft.theta)), reach)) return 'new';
      return { erase: !draft.erased[sectorAt(angle)], from: angle };
    },
    [project],
  );
  const onRing = useCallback(
    (phase: Phase, at: ImagePoint, reach: number) => {
      const draft = store.ring.get();
      const place = galactic(at);
      if (phase === 'drop') return store.ring.set(held.current.before);
      if (!place) return;
      if (phase === 'begin') {
        const grip = gripAt(draft, at, place, reach);
        held.current = { grip, before: draft };
        if (grip === 'new') store.ring.set(ringThrough(place, place, draft && { ...draft, erased: NONE }));
        return;
      }
      if (!draft) return;
      const { grip } = held.current;
      if (grip === 'new') store.ring.set(ringThrough(draft.centre, place, draft));
      else if (grip === 'rim') store.ring.set(ringThrough(draft.centre, place, draft));
      else if (grip === 'centre') store.ring.set({ ...draft, centre: place });
      else {
        const to = positionAngle(draft.centre, place);
        store.ring.set(withErased(draft, grip.from, to, grip.erase));
        held.current.grip = { ...grip, from: to };
      }
    },
    [store, galactic, gripAt],
  );

  const change = useCallback(
    (by: (draft: RingDraft) => RingDraft) => {
      const draft = store.ring.get();
      if (draft) store.ring.set(by(draft));
    },
    [store],
  );
  const drop = useCallback(() => store.ring.set(null), [store]);
  const confirm = useCallback(() => {
    const draft = store.ring.get();
    if (!draft) return;
    const { addMarks, usualSigma } = latest.current;
    const sigma = Number((usualSigma * sigmaFactor(draft)).toPrecision(4));
    const places = ringPlaces(draft).flatMap(({ lon, lat }) => wcs.galacticToPixel(lon, lat) ?? []);
    addMarks(
      places.map((at) => ({ ...at, sigma })),
      'ring',
    );
    store.ring.set(null);
  }, [store, wcs]);

  const onRingKey = useCallback(
    (key: string, shift: boolean): boolean => {
      const { active, expected, say } = latest.current;
      if (!active) return false;
      const draft = store.ring.get();
      if (!draft) {
        const at = store.crosshair.get();
        const place = at && galactic(at);
        if (key !== 'Enter' || !place) return false;
        const theta = expected ?? degreesPerPixel(axes, wcs) * Math.min(axes.nx, axes.ny) * 0.15;
        store.ring.set(withTheta(ringThrough(place, place), theta));
        say(
          'A circle is drawn here. Arrow keys move it, with Shift they change its radius and turn its handle.',
        );
        return true;
      }
      const step = KEY_STEPS * nudgeStep(axes, wcs, false);
      const action = ringKey(draft, key, shift, step * degreesPerPixel(axes, wcs), (dx, dy) => {
        const centre = project(draft.centre);
        return centre && galactic({ x: centre.x + dx * step, y: centre.y + dy * step });
      });
      if (action === null) return false;
      if (action === 'confirm') confirm();
      else if (action === 'drop') drop();
      else {
        store.ring.set(action);
        say(`Circle of ${action.theta.toPrecision(3)}°, ${action.marks} marks.`);
      }
      return true;
    },
    [store, axes, wcs, galactic, project, confirm, drop],
  );

  const onMap = useCallback(
    (draft: RingDraft): RingOnMap => {
      const jump = Math.max(nx, ny) / 2;
      const arcs: Record<'seen' | 'erased', LonLat[][]> = { seen: [], erased: [] };
      for (let i = 0; i < SECTORS; i++) {
        const arc = [0, 0.5, 1].map((s) => destination(draft.centre, ((i + s) * 360) / SECTORS, draft.theta));
        arcs[draft.erased[i] ? 'erased' : 'seen'].push(arc);
      }
      const path = (some: LonLat[][]) => some.flatMap((arc) => pathThrough(arc, project, jump));
      return {
        seen: path(arcs.seen),
        erased: path(arcs.erased),
        centre: project(draft.centre),
        handle: project(destination(draft.centre, draft.handle, draft.theta)),
        marks: ringPlaces(draft).flatMap((place) => project(place) ?? []),
      };
    },
    [nx, ny, project],
  );
  return useMemo(
    () => ({ onRing, onRingKey, onMap, change, confirm, drop }),
    [onRing, onRingKey, onMap, change, confirm, drop],
  );
}

const NONE = new Array<boolean>(SECTORS).fill(false);
