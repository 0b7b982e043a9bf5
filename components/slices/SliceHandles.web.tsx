import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { useSession } from '@/components/cube/session';
import { handlesOf, moved, outlines, type Handle } from '@/components/slices/slice';
import { useTheme } from '@/components/ui/theme';
import { radius, touch } from '@/components/ui/tokens';
import { useValue } from '@/hooks/valueStore';
import { pathThrough } from '@/shared/image/skyPath';
import { toImage, toScreen, type Viewport } from '@/shared/image/viewport';

const DOT = 16;
const KEYS: Record<string, readonly [number, number]> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};
/** Screen pixels an arrow key moves a handle by; with Shift five times as far. */
const STEP = 4;
const itself = (v: Viewport | null) => v;

/** The slice as it lies on the map, with handles to drag. */
export function SliceHandles() {
  const { seeing, seen, store } = useSession();
  const { color } = useTheme();
  const v = useValue(store.viewport, itself);
  const box = useRef<HTMLDivElement>(null);
  const frame = useRef(0);
  const { slice } = seeing;
  if (!slice || !v) return null;
  const project = ({ lon, lat }: { lon: number; lat: number }) => seen.sky.galacticToPixel(lon, lat);
  const lines = outlines(slice).flatMap((line) => pathThrough(line, project, Math.max(v.nx, v.ny) / 2));
  const path = lines
    .map((piece) =>
      piece
        .map((p, i) => {
          const { sx, sy } = toScreen(v, p);
          return `${i === 0 ? 'M' : 'L'}${sx.toFixed(1)} ${sy.toFixed(1)}`;
        })
        .join(''),
    )
    .join('');
  const moveTo = (handle: number, sx: number, sy: number) => {
    const at = toImage(v, { sx, sy });
    const place = seen.sky.pixelToGalactic(at.x, at.y);
    if (!place) return;
    cancelAnimationFrame(frame.current); // one change a frame, however often the pointer tells
    frame.current = requestAnimationFrame(() =>
      seeing.change({ slice: moved(slice, handle, { lon: place.l, lat: place.b }) }),
    );
  };
  const onMove = (handle: number) => (e: PointerEvent) => {
    const rect = box.current?.getBoundingClientRect();
    if (e.buttons > 0 && rect) moveTo(handle, e.clientX - rect.left, e.clientY - rect.top);
  };
  const onKey = (handle: number, at: Handle['at']) => (e: KeyboardEvent) => {
    const way = KEYS[e.key];
    const pixel = project(at);
    if (!way || !pixel) return;
    e.preventDefault();
    e.stopPropagation();
    const { sx, sy } = toScreen(v, pixel);
    const step = STEP * (e.shiftKey ? 5 : 1);
    moveTo(handle, sx + way[0] * step, sy - way[1] * step);
  };
  return (
    <div ref={box} style={{ position: 'absolute', inset: 0, overflow: 'hidden', pointerEvents: 'none' }}>
      <svg width={v.width} height={v.height} aria-hidden style={{ position: 'absolute', inset: 0 }}>
        <path d={path} fill="none" stroke={color.edgeOnImage} strokeWidth={4.5} strokeOpacity={0.55} />
        <path d={path} fill="none" stroke={color.onImage} strokeWidth={1.75} strokeDasharray="7 4" />
      </svg>
      {handlesOf(slice).map(({ name, at }, i) => {
        const pixel = project(at);
        if (!pixel) return null;
        const { sx, sy } = toScreen(v, pixel);
        return (
          <button
            key={name}
            type="button"
            aria-label={`${name}; arrow keys move it`}
            onPointerDown={(e) => e.currentTarget.setPointerCapture(e.pointerId)}
            onPointerMove={onMove(i)}
            onKeyDown={onKey(i, at)}
            style={{
              position: 'absolute',
              left: sx - touch / 2,
              top: sy - touch / 2,
              width: touch,
              height: touch,
              padding: 0,
              border: 0,
              background: 'transparent',
              borderRadius: radius.round,
              touchAction: 'none',
              pointerEvents: 'auto',
              cursor: 'grab',
              display: 'grid',
              placeItems: 'center',
            }}
          >
            <span
              style={{
                width: DOT,
                height: DOT,
                boxSizing: 'border-box',
                borderRadius: radius.round,
                border: `3px solid ${color.onImage}`,
                background: color.edgeOnImage,
              }}
            />
          </button>
        );
      })}
    </div>
  );
}
