import { useEffect, useRef } from 'react';
import type { MagnifierProps } from '@/components/map/Magnifier';
import { useTheme } from '@/components/ui/theme';
import { useValue } from '@/hooks/valueStore';
import type { ScreenPoint } from '@/shared/image/viewport';

/** Side of the glass, its distance from the finger, and how much it enlarges. */
const SIZE = 124;
const AWAY = 40;
const TIMES = 2.5;
const itself = (at: ScreenPoint | null) => at;

/** What lies under the finger, enlarged beside it: above, or below where there is no room above. */
export function Magnifier({ map, store }: MagnifierProps) {
  const at = useValue(store.aim, itself);
  const { color } = useTheme();
  const glass = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const ctx = at && glass.current?.getContext('2d');
    if (!ctx || !map.current) return;
    const paint = () => {
      const layers = map.current?.querySelectorAll('canvas') ?? [];
      const ratio = Math.min(globalThis.devicePixelRatio || 1, 3);
      const side = SIZE / TIMES;
      ctx.setTransform(ratio, 0, 0, ratio, 0, 0);
      ctx.fillStyle = color.image;
      ctx.fillRect(0, 0, SIZE, SIZE);
      for (const layer of Array.from(layers)) {
        if (layer === glass.current || layer.clientWidth === 0) continue;
        const each = layer.width / layer.clientWidth;
        const [x, y] = [(at.sx - side / 2) * each, (at.sy - side / 2) * each];
        ctx.drawImage(layer, x, y, side * each, side * each, 0, 0, SIZE, SIZE);
      }
      ctx.beginPath();
      for (const [dx, dy] of [
        [1, 0],
        [-1, 0],
        [0, 1],
        [0, -1],
      ] as const) {
        ctx.moveTo(SIZE / 2 + 6 * dx, SIZE / 2 + 6 * dy);
        ctx.lineTo(SIZE / 2 + 22 * dx, SIZE / 2 + 22 * dy);
      }
      ctx.strokeStyle = color.edgeOnImage;
      ctx.lineWidth = 4;
      ctx.stroke();
      ctx.strokeStyle = color.personOnImage;
      ctx.lineWidth = 1.5;
      ctx.stroke();
    };
    // after the layers themselves were drawn in this frame
    const frame = requestAnimationFrame(paint);
    return () => cancelAnimationFrame(frame);
  }, [at, map, color]);
  if (!at) return null;
  const ratio = Math.min(globalThis.devicePixelRatio || 1, 3);
  const width = map.current?.clientWidth ?? SIZE;
  const above = at.sy - AWAY - SIZE;
  const left = Math.min(Math.max(at.sx - SIZE / 2, 4), width - SIZE - 4);
  return (
    <canvas
      ref={glass}
      data-testid="magnifier"
      aria-hidden
      width={SIZE * ratio}
      height={SIZE * ratio}
      style={{
        position: 'absolute',
        left,
        top: above >= 4 ? above : at.sy + AWAY,
        width: SIZE,
        height: SIZE,
        borderRadius: SIZE / 2,
        border: `2px solid ${color.onImage}`,
        boxSizing: 'border-box',
        pointerEvents: 'none',
        zIndex: 3, // over what lies on the map beside it
      }}
    />
  );
}
