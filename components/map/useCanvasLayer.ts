import { useCallback, useEffect, useLayoutEffect, useRef, type RefObject } from 'react';
import type { ValueStore } from '@/hooks/valueStore';
import type { Viewport } from '@/shared/image/viewport';

export type DrawLayer = (ctx: CanvasRenderingContext2D, viewport: Viewport, ratio: number) => void;

/**
 * A canvas that is drawn at once when what it shows changes, and once a frame while the viewport moves.
 * Moving the map renders nothing in React.
 */
export function useCanvasLayer(
  viewport: ValueStore<Viewport | null>,
  draw: DrawLayer,
): { canvas: RefObject<HTMLCanvasElement | null>; schedule: () => void; redraw: () => void } {
  const canvas = useRef<HTMLCanvasElement>(null);
  const latest = useRef(draw);
  const frame = useRef(0);

  const redraw = useCallback(() => {
    const element = canvas.current;
    const v = viewport.get();
    const ctx = element?.getContext?.('2d');
    if (!element || !ctx || !v) return;
    const ratio = Math.min(globalThis.devicePixelRatio || 1, 3);
    const [width, height] = [Math.round(v.width * ratio), Math.round(v.height * ratio)];
    if (element.width !== width || element.height !== height) {
      element.width = width;
      element.height = height;
    }
    latest.current(ctx, v, ratio);
  }, [viewport]);

  const schedule = useCallback(() => {
    if (frame.current) return;
    frame.current = requestAnimationFrame(() => {
      frame.current = 0;
      redraw();
    });
  }, [redraw]);

  useLayoutEffect(() => {
    latest.current = draw;
    redraw();
  }, [draw, redraw]);

  useEffect(() => viewport.subscribe(schedule), [viewport, schedule]);
  useEffect(
    () => () => {
      cancelAnimationFrame(frame.current);
      frame.current = 0;
    },
    [],
  );
  return { canvas, schedule, redraw };
}
