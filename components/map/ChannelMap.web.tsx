import { useEffect, useRef } from 'react';
import type { ChannelMapProps } from '@/components/map/ChannelMap';
import { Magnifier } from '@/components/map/Magnifier';
import { Overlay } from '@/components/map/Overlay';
import { Raster } from '@/components/map/Raster';
import { useMapKeys } from '@/components/map/useMapKeys';
import { usePointerGestures } from '@/components/map/usePointerGestures';
import { useTheme } from '@/components/ui/theme';
import { fitted, looking, resized } from '@/shared/image/viewport';

/** The channel map: picture, overlay, pointers and the keyboard's crosshair. */
export function ChannelMap(props: ChannelMapProps) {
  const { store, nx, ny, start, tool } = props;
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

  const keyboard = useMapKeys(element, props);

  return (
    <div
      ref={element}
      role="application"
      tabIndex={0}
      aria-label={props.label}
      aria-roledescription="channel map"
      aria-keyshortcuts="ArrowLeft ArrowRight ArrowUp ArrowDown Enter"
      data-testid="map"
      {...keyboard}
      style={{
        position: 'absolute',
        inset: 0,
        overflow: 'hidden',
        touchAction: 'none',
        userSelect: 'none',
        background: color.image,
        outlineOffset: -3, // the frame around the map would cut a ring outside it
        cursor: tool === 'move' ? 'grab' : 'crosshair',
      }}
    >
      <Raster store={store} plane={props.plane} look={props.look} stale={props.stale} />
      <Overlay store={store} scene={props.scene} tools={props.tools} />
      <Magnifier map={element} store={store} />
    </div>
  );
}
