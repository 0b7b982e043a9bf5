import type { ValueStore } from '@/hooks/valueStore';
import type { Viewport } from '@/shared/image/viewport';

/** Keep two maps of one image at one place and zoom, whichever is moved; returns what unties them. */
export function linkViewports(a: ValueStore<Viewport | null>, b: ValueStore<Viewport | null>): () => void {
  let busy = false;
  const follow = (from: ValueStore<Viewport | null>, to: ValueStore<Viewport | null>) => () => {
    const [lead, own] = [from.get(), to.get()];
    if (busy || !lead || !own || lead.nx !== own.nx || lead.ny !== own.ny) return;
    if (lead.x === own.x && lead.y === own.y && lead.scale === own.scale) return;
    busy = true; // what follows leads nobody
    to.set({ ...own, x: lead.x, y: lead.y, scale: lead.scale });
    busy = false;
  };
  const [onA, onB] = [follow(a, b), follow(b, a)];
  // the second one has no size yet: it takes up the place as soon as it has
  let seenB = b.get() !== null;
  if (seenB) onA();
  const stops = [
    a.subscribe(onA),
    b.subscribe(() => {
      if (seenB) return onB();
      seenB = b.get() !== null;
      onA();
    }),
  ];
  return () => stops.forEach((stop) => stop());
}
