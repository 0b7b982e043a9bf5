import { useState } from 'react';
import { VIEWS, type View } from '@/components/cube/views';
import { useMapPlane } from '@/hooks/planes/useMapPlane';
import type { Planes } from '@/hooks/planes/usePlanes';
import type { Cube, MapKind } from '@/shared/contract/cubes';
import type { Palette } from '@/shared/image/palettes';
import type { Tone } from '@/shared/image/tone';

export interface ViewControl {
  view: View;
  setView: (view: View) => void;
  /** Of the map shown; nothing while a channel is. */
  planes: Planes;
}

/** Which picture is shown: a channel, or a map of all of them. */
export function useView(cube: Cube, start: MapKind | null): ViewControl {
  const [view, setView] = useState<View>(start ?? 'channel');
  const planes = useMapPlane(cube, view === 'channel' ? null : view);
  return { view, setView, planes };
}

/** Pictures whose numbers are not a channel's brightness and so have a look of their own. */
export type OwnKind = MapKind | 'difference' | 'less';

interface KindLook {
  /** What it begins with; null: as the channels have it. */
  palette: Palette | null;
  tone: Tone | null;
  /** Its window lies evenly about zero. */
  aboutZero?: boolean;
}

export const OWN_LOOKS: Record<OwnKind, KindLook> = {
  total: VIEWS.total,
  peak: VIEWS.peak,
  velocity: VIEWS.velocity,
  dispersion: VIEWS.dispersion,
  difference: { palette: 'Parting', tone: 'even', aboutZero: true },
  less: { palette: null, tone: 'even' },
};
