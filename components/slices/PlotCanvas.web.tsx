import { useEffect, useLayoutEffect, useRef, useState, type PointerEvent } from 'react';
import type { PlotCanvasProps } from '@/components/slices/PlotCanvas';

/** A canvas as wide as its place, drawn anew when what it shows changes. */
export function PlotCanvas({ label, height, draw, onPoint }: PlotCanvasProps) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const [width, setWidth] = useState(0);
  useEffect(() => {
    const element = canvas.current?.parentElement;
    if (!element) return;
    const observer = new ResizeObserver(([entry]) => setWidth(Math.floor(entry!.contentRect.width)));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  useLayoutEffect(() => {
    const element = canvas.current;
    const ctx = element?.getContext?.('2d');
    if (!element || !ctx || width === 0) return;
    const ratio = Math.min(globalThis.devicePixelRatio || 1, 3);
    element.width = Math.round(width * ratio);
    element.height = Math.round(height * ratio);
    ctx.setTransform(ratio, 0, 0, ratio, 0, 0);
    ctx.clearRect(0, 0, width, height);
    draw(ctx, width, height);
  }, [draw, width, height]);
  const point = (e: PointerEvent<HTMLCanvasElement>) => {
    const box = e.currentTarget.getBoundingClientRect();
    onPoint?.(e.clientX - box.left, e.clientY - box.top, width, height);
  };
  return (
    <div style={{ width: '100%', height }}>
      <canvas
        ref={canvas}
        role="img"
        aria-label={label}
        data-testid="slice-plot"
        onPointerDown={(e) => {
          e.currentTarget.setPointerCapture(e.pointerId);
          point(e);
        }}
        onPointerMove={(e) => e.buttons > 0 && point(e)}
        style={{ display: 'block', width: '100%', height, touchAction: 'pan-y' }}
      />
    </div>
  );
}
