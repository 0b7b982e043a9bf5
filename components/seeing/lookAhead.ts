import { startTransition } from 'react';
import type { LookControl } from '@/components/cube/useLook';
import type { ValueStore } from '@/hooks/valueStore';
import { rampOf } from '@/shared/image/palettes';
import type { Look } from '@/shared/image/tone';

/**
 * The same control, whose changes are drawn at once: the picture need not wait until the page, of which every part shows
 * the look, has followed.
 */
export function drawnAhead(control: LookControl, early: ValueStore<Look | null>): LookControl {
  const { look } = control;
  return {
    ...control,
    setPalette(palette) {
      early.set({ ...look, ramp: rampOf(palette) });
      startTransition(() => control.setPalette(palette));
    },
    setTone(tone) {
      early.set({ ...look, tone });
      startTransition(() => control.setTone(tone));
    },
    setWindow(window) {
      if (window) early.set({ ...look, window });
      startTransition(() => control.setWindow(window));
    },
  };
}
