import { useEffect, useRef, type KeyboardEvent } from 'react';
import type { ChannelMapProps } from '@/components/map/ChannelMap';
import { Overlay } from '@/components/map/Overlay';
import { Raster } from '@/components/map/Raster';
import { usePointerGestures } from '@/components/map/usePointerGestures';
import { useTheme } from '@/components/ui/theme';
import {
  clamped,
  fitted,
  looking,
  resized,
  toScreen,
  within,
  type ImagePoint,
} from '@/shared/image/viewport';

/** Screen pixels an arrow key moves the crosshair by; with Shift five times as far. */
const CROSSHAIR_STEP = 6;
const ARROWS: Record<string, readonly [number, number]> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};

/** The channel map: picture, overlay, pointers and the keyboard's crosshair. */
export function ChannelMap(props: ChannelMapProps) {
  const { store, nx, ny, start, marking } = props;
  const { color } = useTheme();
  const element = useRef<HTMLDivElement>(null);
  usePointerGestures(element, props);

  // Where to look at first counts once; from then on the map goes by what the person does.
  const first = useRef(start);
  useEffect(() => {
    const target = element.current;
    if (!target) return;
    const observer = new ResizeObserver(() => {
      const { clientWidth: width, clientHeight: height } = target;
      if (width === 0 || height === 0) return;
      const v = store.viewport.get();
      if (v && v.nx === nx && v.ny === ny) return store.viewport.set(resized(v, width, height));
      const whole = fitted(nx, ny, width, height);
      const at = first.current;
      store.viewport.set(at ? looking(whole, at.x, at.y, at.zoom) : whole);
    });
    observer.observe(target);
    return () => observer.disconnect();
  }, [store, nx, ny]);

  const crosshairAt = (at: ImagePoint) => {
    const v = store.viewport.get();
    if (!v) return;
    const inside = within({ nx, ny }, at);
    store.crosshair.set(inside);
    store.hover.set(inside);
    // Take the map along when the crosshair reaches its border.
    const { sx, sy } = toScreen(v, inside);
    const border = 24;
    const over = (s: number, size: number) => Math.min(s - border, 0) + Math.max(s - size + border, 0);
    const [dx, dy] = [over(sx, v.width), over(sy, v.height)];
    if (dx || dy) store.viewport.set(clamped({ ...v, x: v.x + dx / v.scale, y: v.y - dy / v.scale }));
  };
  const onKeyDown = (e: KeyboardEvent) => {
    const v = store.viewport.get();
    if (!v || e.ctrlKey || e.metaKey || e.altKey) return;
    const arrow = ARROWS[e.key];
    const at = store.crosshair.get();
    if (arrow) {
      const step = ((e.shiftKey ? 5 : 1) * CROSSHAIR_STEP) / v.scale;
      const from = at ?? { x: v.x, y: v.y };
      crosshairAt({ x: from.x + arrow[0] * step, y: from.y + arrow[1] * step });
    } else if (e.key === 'Enter' && marking && at) props.onPlace(at);
    else if (e.key === 'Escape' && at) store.crosshair.set(null);
    else return;
    e.preventDefault();
    e.stopPropagation();
  };
  const onFocus = () => {
    const v = store.viewport.get();
    if (v && element.current?.matches(':focus-visible')) crosshairAt({ x: v.x, y: v.y });
  };

  return (
    <div
      ref={element}
      role="application"
      tabIndex={0}
      aria-label={props.label}
      aria-roledescription="channel map"
      aria-keyshortcuts="ArrowLeft ArrowRight ArrowUp ArrowDown Enter"
      data-testid="map"
      onKeyDown={onKeyDown}
      onFocus={onFocus}
      onBlur={() => store.crosshair.set(null)}
      style={{
        position: 'absolute',
        inset: 0,
        overflow: 'hidden',
        touchAction: 'none',
        userSelect: 'none',
        background: color.image,
        outlineOffset: -3, // the frame around the map would cut a ring outside it
        cursor: marking ? 'crosshair' : 'grab',
      }}
    >
      <Raster store={store} plane={props.plane} look={props.look} stale={props.stale} />
      <Overlay store={store} scene={props.scene} />
    </div>
  );
}
