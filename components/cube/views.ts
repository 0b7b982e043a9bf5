import type { MapKind } from '@/shared/contract/cubes';
import type { Palette } from '@/shared/image/palettes';
import type { Tone } from '@/shared/image/tone';

/** What the picture shows: one channel, or a map made of all of them. */
export type View = 'channel' | MapKind;

interface ViewWords {
  /** On the choice. */
  label: string;
  /** In a sentence: “… of all channels”. */
  long: string;
  /** What a map begins with; null: as the channels have it. */
  palette: Palette | null;
  tone: Tone | null;
}

export const VIEWS: Record<View, ViewWords> = {
  channel: { label: 'Channel', long: 'Channel map', palette: null, tone: null },
  total: { label: 'Total', long: 'Total-intensity map', palette: null, tone: 'even' },
  peak: { label: 'Peak', long: 'Map of the peak brightness', palette: null, tone: 'even' },
  velocity: { label: 'Velocity', long: 'Map of the mean velocity', palette: 'Parting', tone: 'even' },
  dispersion: { label: 'Dispersion', long: 'Map of the velocity dispersion', palette: 'Ember', tone: 'even' },
};
export const VIEW_ORDER: readonly View[] = ['channel', 'total', 'peak', 'velocity', 'dispersion'];

/** The unit of what is shown; null where the brightness has none. */
export function unitOf(view: View, brightness: string | null): string | null {
  if (view === 'velocity' || view === 'dispersion') return 'km/s';
  return view === 'total' && brightness ? `${brightness} km/s` : brightness;
}
