import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { ENDS, movedEnd, shareOf } from '@/components/cube/windowScale';
import type { WindowSliderProps } from '@/components/cube/WindowSlider';
import { brightness } from '@/components/cube/words';
import { useTheme } from '@/components/ui/theme';
import { radius, touch } from '@/components/ui/tokens';

const STEP = 0.01;
const HANDLE = 22;

/** The brightness window as a track with two handles; what lies between them is the palette. */
export function WindowSlider({ window, range, unit, gradient, onChange }: WindowSliderProps) {
  const { color } = useTheme();
  const track = useRef<HTMLDivElement>(null);
  const held = useRef<0 | 1 | null>(null);
  const shares = [shareOf(range, window[0]), shareOf(range, window[1])] as const;

  const shareAt = (e: PointerEvent) => {
    const box = track.current!.getBoundingClientRect();
    return (e.clientX - box.left) / box.width;
  };
  const onPointerDown = (e: PointerEvent) => {
    const share = shareAt(e);
    held.current = Math.abs(share - shares[0]) <= Math.abs(share - shares[1]) ? 0 : 1;
    (e.currentTarget as HTMLElement).setPointerCapture(e.pointerId);
    onChange(movedEnd(range, window, held.current, share));
  };
  const onPointerMove = (e: PointerEvent) => {
    if (held.current !== null) onChange(movedEnd(range, window, held.current, shareAt(e)));
  };
  const release = () => {
    held.current = null;
  };
  const onKeyDown = (end: 0 | 1) => (e: KeyboardEvent) => {
    const way = { ArrowRight: 1, ArrowUp: 1, ArrowLeft: -1, ArrowDown: -1, PageUp: 10, PageDown: -10 }[e.key];
    const to =
      e.key === 'Home'
        ? 0
        : e.key === 'End'
          ? 1
          : way
            ? shares[end] + way * STEP * (e.shiftKey ? 5 : 1)
            : null;
    if (to === null) return;
    e.preventDefault();
    e.stopPropagation();
    onChange(movedEnd(range, window, end, to));
  };

  return (
    <div
      onPointerDown={onPointerDown}
      onPointerMove={onPointerMove}
      onPointerUp={release}
      onPointerCancel={release}
      style={{
        height: touch,
        touchAction: 'none',
        cursor: 'ew-resize',
        position: 'relative',
        margin: `0 ${HANDLE / 2}px`,
      }}
    >
      <div
        ref={track}
        style={{
          position: 'absolute',
          left: 0,
          right: 0,
          top: touch / 2 - 4,
          height: 8,
          borderRadius: 4,
          background: color.chip,
        }}
      >
        <div
          style={{
            position: 'absolute',
            left: `${shares[0] * 100}%`,
            right: `${(1 - shares[1]) * 100}%`,
            height: 8,
            background: gradient,
            borderRadius: 2,
          }}
        />
      </div>
      {ENDS.map((name, end) => (
        <div
          key={name}
          role="slider"
          tabIndex={0}
          aria-label={name}
          aria-valuemin={range.low}
          aria-valuemax={range.high}
          aria-valuenow={window[end]!}
          aria-valuetext={`${brightness(window[end]!)} ${unit ?? ''}`}
          onKeyDown={onKeyDown(end as 0 | 1)}
          style={{
            position: 'absolute',
            left: `calc(${shares[end]! * 100}% - ${HANDLE / 2}px)`,
            top: (touch - HANDLE) / 2,
            width: HANDLE,
            height: HANDLE,
            boxSizing: 'border-box',
            borderRadius: radius.round,
            border: `2px solid ${color.text}`,
            background: color.raised,
          }}
        />
      ))}
    </div>
  );
}
