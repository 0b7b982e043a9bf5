import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import type { DiagramHandlesProps } from '@/components/diagram/DiagramHandles';
import { draggedTo, handleAt, keyed, type Handle } from '@/components/diagram/setModel';
import { useTheme } from '@/components/ui/theme';
import { touch } from '@/components/ui/tokens';
import { velocityLabel } from '@/shared/image/velocityDigits';

const HANDLES: readonly Handle[] = ['crown', 'low', 'high'];
const NAMES: Record<Handle, string> = {
  crown: 'Crown of the model: radius and systemic velocity',
  low: 'Lower foot of the model: expansion velocity',
  high: 'Upper foot of the model: expansion velocity',
};
const SIZE = 13;

/** The model's crown and feet, to be dragged or moved by arrow keys. */
export function DiagramHandles(props: DiagramHandlesProps) {
  const { layout, domain, model, channelWidth, onModel, onHold } = props;
  const { color } = useTheme();
  const layer = useRef<HTMLDivElement>(null);
  const held = useRef<{ dx: number; dy: number } | null>(null);

  const place = (e: PointerEvent) => {
    const box = layer.current!.getBoundingClientRect();
    return { x: e.clientX - box.left, y: e.clientY - box.top };
  };
  const onDown = (handle: Handle) => (e: PointerEvent<HTMLDivElement>) => {
    if (e.button !== 0) return;
    e.currentTarget.setPointerCapture(e.pointerId);
    const [from, at] = [place(e), handleAt(handle, model, layout)];
    held.current = { dx: at.x - from.x, dy: at.y - from.y }; // the handle must not jump to the pointer
    onHold(true);
  };
  const onMove = (handle: Handle) => (e: PointerEvent<HTMLDivElement>) => {
    if (!held.current) return;
    const at = place(e);
    const to = { x: at.x + held.current.dx, y: at.y + held.current.dy };
    onModel(draggedTo(handle, to, model, layout, domain, channelWidth));
  };
  const onUp = () => {
    if (!held.current) return;
    held.current = null;
    onHold(false);
  };
  const onKeyDown = (handle: Handle) => (e: KeyboardEvent) => {
    if (e.ctrlKey || e.metaKey || e.altKey) return;
    const by = keyed(handle, e.key, e.shiftKey, model, channelWidth);
    if (!by) return;
    e.preventDefault();
    e.stopPropagation();
    onModel(by);
  };

  return (
    <div ref={layer} style={{ position: 'absolute', inset: 0, pointerEvents: 'none' }}>
      {HANDLES.map((handle) => {
        const { x, y } = handleAt(handle, model, layout);
        const value = handle === 'crown' ? model.theta : model.vExp;
        const text =
          handle === 'crown'
            ? `${model.theta.toPrecision(3)} degrees at ${velocityLabel(model.vSys, channelWidth)} km/s`
            : `${velocityLabel(model.vExp, channelWidth)} km/s`;
        return (
          <div
            key={handle}
            role="slider"
            tabIndex={0}
            aria-label={NAMES[handle]}
            aria-valuenow={Number(value.toPrecision(4))}
            aria-valuetext={text}
            title={NAMES[handle]}
            data-testid={`handle-${handle}`}
            onPointerDown={onDown(handle)}
            onPointerMove={onMove(handle)}
            onPointerUp={onUp}
            onPointerCancel={onUp}
            onKeyDown={onKeyDown(handle)}
            style={{
              position: 'absolute',
              left: Math.min(Math.max(x, layout.left), layout.right) - touch / 2,
              top: y - touch / 2,
              width: touch,
              height: touch,
              borderRadius: touch / 2,
              display: 'flex',
              alignItems: 'center',
              justifyContent: 'center',
              touchAction: 'none',
              pointerEvents: 'auto',
              cursor: handle === 'crown' ? 'move' : 'ew-resize',
            }}
          >
            <div
              style={{
                width: SIZE,
                height: SIZE,
                boxSizing: 'border-box',
                borderRadius: handle === 'crown' ? SIZE / 2 : 2,
                border: `2px solid ${color.model}`,
                background: color.panel,
              }}
            />
          </div>
        );
      })}
    </div>
  );
}
