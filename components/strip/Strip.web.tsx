import {
  useCallback,
  useEffect,
  useLayoutEffect,
  useMemo,
  useRef,
  useState,
  type KeyboardEvent,
} from 'react';
import { drawStrip, STRIP_HEIGHT, type StripColours } from '@/components/strip/drawStrip';
import type { StripProps } from '@/components/strip/Strip';
import { held, stripLayout } from '@/components/strip/stripLayout';
import { stripText } from '@/components/strip/stripText';
import { useStripDrag } from '@/components/strip/useStripDrag';
import { useTheme } from '@/components/ui/theme';
import { fonts, typeScale } from '@/components/ui/tokens';

const KEYS: Record<string, number> = {
  ArrowLeft: -1,
  ArrowDown: -1,
  ArrowRight: 1,
  ArrowUp: 1,
  PageDown: -5,
  PageUp: 5,
  Home: -Infinity,
  End: Infinity,
};

const NONE: readonly number[] = [];

/** Thumbnails, mean spectrum, marks and the model's span in one object: the velocity scrubber. */
export function Strip(props: StripProps) {
  const { order, channel, onChannel, picture, spectrum, marks, span, next = NONE } = props;
  const { color } = useTheme();
  const element = useRef<HTMLDivElement>(null);
  const canvas = useRef<HTMLCanvasElement>(null);
  const [width, setWidth] = useState(0);
  const pointer = globalThis.matchMedia?.('(pointer: coarse)').matches ? 'coarse' : 'fine';
  const layout = useMemo(
    () => stripLayout(Math.max(width, 1), order.channels.length, pointer),
    [width, order, pointer],
  );
  const position = order.positions[channel] ?? 0;
  /** A running film is between channels; at rest it follows the channel shown. */
  const film = useRef<number | null>(null);

  const colours = useMemo<StripColours>(
    () => ({
      image: color.image,
      text: color.text,
      quiet: color.quiet,
      person: color.personOnImage,
      model: color.model,
      edge: color.edgeOnImage,
      box: color.onImage,
      pointer: color.text,
      ground: color.ground,
      font: `${typeScale.small[0]}px ${fonts.mono}, monospace`,
    }),
    [color],
  );
  const draw = useCallback(() => {
    const ctx = canvas.current?.getContext?.('2d');
    if (!canvas.current || !ctx || width === 0) return;
    const ratio = Math.min(globalThis.devicePixelRatio || 1, 3);
    const [w, h] = [Math.round(width * ratio), Math.round(STRIP_HEIGHT * ratio)];
    if (canvas.current.width !== w || canvas.current.height !== h) {
      canvas.current.width = w;
      canvas.current.height = h;
    }
    const running = film.current;
    const current = running !== null && Math.round(running) === position ? running : position;
    drawStrip(ctx, { layout, order, current, picture, spectrum, marks, span, next }, colours, ratio);
  }, [layout, order, position, picture, spectrum, marks, span, next, colours, width]);
  useLayoutEffect(draw, [draw]);

  useEffect(() => {
    if (!element.current) return;
    const observer = new ResizeObserver(([entry]) => setWidth(Math.floor(entry!.contentRect.width)));
    observer.observe(element.current);
    return () => observer.disconnect();
  }, []);

  const go = (to: number) => {
    const target = order.channels[held(layout, to)];
    if (target !== undefined && target !== channel) onChannel(target);
  };
  useStripDrag(element, {
    layout,
    position,
    onPosition: go,
    onFilm(at) {
      film.current = at;
      if (Math.round(at) === position) draw(); // else the new channel's render draws
    },
  });
  const onKeyDown = (e: KeyboardEvent) => {
    const step = KEYS[e.key];
    if (step === undefined || e.ctrlKey || e.metaKey || e.altKey) return;
    e.preventDefault();
    e.stopPropagation();
    film.current = null;
    go(position + step * (e.shiftKey ? 5 : 1));
  };

  return (
    <div
      ref={element}
      role="slider"
      tabIndex={0}
      aria-label="Channel"
      aria-orientation="horizontal"
      aria-valuemin={1}
      aria-valuemax={order.channels.length}
      aria-valuenow={position + 1}
      aria-valuetext={stripText(props)}
      data-testid="strip"
      onKeyDown={onKeyDown}
      style={{
        width: '100%',
        height: STRIP_HEIGHT,
        touchAction: 'pan-y',
        userSelect: 'none',
        cursor: layout.film ? 'grab' : 'ew-resize',
      }}
    >
      <canvas ref={canvas} style={{ display: 'block', width: '100%', height: STRIP_HEIGHT }} />
    </div>
  );
}
