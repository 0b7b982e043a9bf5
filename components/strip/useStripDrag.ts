import { listenToPointers } from '@/components/map/pointerEvents';
import { useEffect, useRef, type RefObject } from 'react';
import { flickedBy, flickLasts, speedOf, type Sample } from '@/components/strip/flick';
import { held, positionAt, type StripLayout } from '@/components/strip/stripLayout';

/** Wheel pixels for one channel. */
const WHEEL_NOTCH = 40;
const TAP_PX = 5;

export interface StripDrag {
  layout: StripLayout;
  /** The position of the channel shown. */
  position: number;
  /** Show a position; whole numbers only. */
  onPosition: (position: number) => void;
  /** Draw the film with this fractional position under the box. */
  onFilm: (position: number) => void;
}

const calm = () => globalThis.matchMedia?.('(prefers-reduced-motion: reduce)').matches ?? false;

/** Dragging, flicking and wheeling along the strip; every move goes to its channel at once. */
export function useStripDrag(element: RefObject<HTMLElement | null>, drag: StripDrag): void {
  const latest = useRef(drag);
  useEffect(() => {
    latest.current = drag;
  });

  useEffect(() => {
    const target = element.current;
    if (!target) return;
    let pointer: { id: number; from: number; film: number; moved: boolean; samples: Sample[] } | null = null;
    let film = 0;
    let frame = 0;
    let wheeled = 0;

    const xIn = (e: MouseEvent) => e.clientX - target.getBoundingClientRect().left;
    const show = (position: number) => {
      const { layout, position: now, onPosition, onFilm } = latest.current;
      film = held(layout, position);
      if (layout.film) onFilm(film);
      const whole = Math.round(film);
      if (whole !== now) onPosition(whole);
    };
    const settle = () => {
      const { layout, onFilm } = latest.current;
      film = Math.round(film);
      if (layout.film) onFilm(film);
    };

    const onDown = (e: PointerEvent) => {
      if (e.button !== 0 || pointer) return;
      cancelAnimationFrame(frame);
      target.setPointerCapture?.(e.pointerId);
      const { layout, position } = latest.current;
      const x = xIn(e);
      pointer = {
        id: e.pointerId,
        from: x,
        film: position,
        moved: false,
        samples: [{ x, time: e.timeStamp }],
      };
      if (!layout.film) show(positionAt(layout, x, position));
    };
    const onMove = (e: PointerEvent) => {
      if (e.pointerId !== pointer?.id) return;
      const { layout } = latest.current;
      const x = xIn(e);
      pointer.samples = [...pointer.samples.slice(-8), { x, time: e.timeStamp }];
      if (Math.abs(x - pointer.from) > TAP_PX) pointer.moved = true;
      if (!layout.film) show(positionAt(layout, x, 0));
      else if (pointer.moved) show(pointer.film - (x - pointer.from) / layout.pitch);
    };
    const onUp = (e: PointerEvent) => {
      if (e.pointerId !== pointer?.id) return;
      const { layout } = latest.current;
      const { moved, samples } = pointer;
      pointer = null;
      if (!layout.film) return;
      if (!moved) {
        show(positionAt(layout, xIn(e), latest.current.position));
        return settle();
      }
      const speed = calm() ? 0 : speedOf(samples, e.timeStamp);
      if (speed === 0) return settle();
      const [start, begun, lasts] = [film, performance.now(), flickLasts(speed)];
      const run = () => {
        const ms = performance.now() - begun;
        show(start - flickedBy(speed, ms) / layout.pitch);
        if (ms < lasts && film > 0 && film < layout.count - 1) frame = requestAnimationFrame(run);
        else settle();
      };
      frame = requestAnimationFrame(run);
    };
    const onCancel = (e: PointerEvent) => {
      if (e.pointerId !== pointer?.id) return;
      pointer = null;
      settle();
    };
    const onWheel = (e: WheelEvent) => {
      e.preventDefault();
      const unit = e.deltaMode === 1 ? 16 : 1;
      wheeled += (Math.abs(e.deltaX) > Math.abs(e.deltaY) ? e.deltaX : e.deltaY) * unit;
      const steps = Math.trunc(wheeled / WHEEL_NOTCH);
      if (steps === 0) return;
      wheeled -= steps * WHEEL_NOTCH;
      show(latest.current.position + steps);
      settle();
    };

    const unlisten = listenToPointers(target, { onDown, onMove, onUp, onCancel, onWheel });
    return () => {
      cancelAnimationFrame(frame);
      unlisten();
    };
  }, [element]);
}
