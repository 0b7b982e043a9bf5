export interface PointerListeners {
  onDown: (e: PointerEvent) => void;
  onMove: (e: PointerEvent) => void;
  onUp: (e: PointerEvent) => void;
  onCancel: (e: PointerEvent) => void;
  onLeave?: (e: PointerEvent) => void;
  onWheel: (e: WheelEvent) => void;
}

/**
 * Listen to pointers and wheel on an element itself: React listens to wheels passively, and then the page would
 * scroll under the map. Returns what takes the listeners away again.
 */
export function listenToPointers(target: HTMLElement, on: PointerListeners): () => void {
  const away = new AbortController();
  const { signal } = away;
  target.addEventListener('pointerdown', on.onDown, { signal });
  target.addEventListener('pointermove', on.onMove, { signal });
  target.addEventListener('pointerup', on.onUp, { signal });
  target.addEventListener('pointercancel', on.onCancel, { signal });
  if (on.onLeave) target.addEventListener('pointerleave', on.onLeave, { signal });
  target.addEventListener('wheel', on.onWheel, { passive: false, signal });
  return () => away.abort();
}
