import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type { StripOrder } from '@/components/strip/stripOrder';

export interface Film {
  playing: boolean;
  toggle: () => void;
  stop: () => void;
  /** Channels a second. */
  rate: number;
  setRate: (rate: number) => void;
  mostRate: number;
  /** Positions on the strip between which it runs back and forth. */
  from: number;
  to: number;
  whole: boolean;
  /** Begin or end at the channel shown. */
  setEnd: (end: 'from' | 'to') => void;
  modelSpan: () => void;
  all: () => void;
}

const RATE = 12;
const MOST = 60;
/** Who wants little motion gets slow steps. */
const CALM = { rate: 2, most: 4 };

/** The next position of a film that runs back and forth, and its way from there. */
export function nextFrame(
  position: number,
  way: 1 | -1,
  from: number,
  to: number,
): { position: number; way: 1 | -1 } {
  if (from >= to) return { position: from, way };
  if (position < from || position > to) return { position: from, way: 1 };
  const turned = position + way > to ? -1 : position + way < from ? 1 : way;
  return { position: position + turned, way: turned };
}

/** Plays the channels back and forth between two velocities. */
export function useFilm(
  order: StripOrder,
  channel: number,
  showChannel: (channel: number) => void,
  model: { vSys: number; vExp: number } | null,
): Film {
  const calm = globalThis.matchMedia?.('(prefers-reduced-motion: reduce)').matches ?? false;
  const last = order.channels.length - 1;
  const [playing, setPlaying] = useState(false);
  const [rate, setRate] = useState(calm ? CALM.rate : RATE);
  const [span, setSpan] = useState<readonly [number, number]>([0, last]);
  const [from, to] = span;
  const position = order.positions[channel] ?? 0;
  const here = useRef({ position, way: 1 as 1 | -1, showChannel });
  useEffect(() => {
    here.current = { ...here.current, position, showChannel };
  });

  useEffect(() => {
    if (!playing) return;
    let frame = 0;
    let due = performance.now();
    const run = (now: number) => {
      frame = requestAnimationFrame(run);
      if (now < due) return;
      due = Math.max(due + 1000 / rate, now); // a frame that was missed is not made up for
      const next = nextFrame(here.current.position, here.current.way, from, to);
      here.current = { ...here.current, ...next };
      const target = order.channels[next.position];
      if (target !== undefined) here.current.showChannel(target);
    };
    frame = requestAnimationFrame(run);
    return () => cancelAnimationFrame(frame);
  }, [playing, rate, from, to, order]);

  const toggle = useCallback(() => setPlaying((on) => !on), []);
  const stop = useCallback(() => setPlaying(false), []);
  const setEnd = useCallback((end: 'from' | 'to') => {
    const { position: at } = here.current;
    setSpan(([a, b]) => (end === 'from' ? [at, Math.max(at, b)] : [Math.min(a, at), at]));
  }, []);
  const all = useCallback(() => setSpan([0, last]), [last]);
  const modelSpan = useCallback(() => {
    if (!model) return;
    const inside = order.velocities.flatMap((v, p) =>
      Math.abs(v - model.vSys) <= model.vExp * 1.1 ? [p] : [],
    );
    if (inside.length > 1) setSpan([inside[0]!, inside[inside.length - 1]!]);
  }, [model, order]);
  return useMemo(
    () => ({
      playing,
      toggle,
      stop,
      rate,
      setRate,
      mostRate: calm ? CALM.most : MOST,
      from,
      to,
      whole: from === 0 && to === last,
      setEnd,
      modelSpan,
      all,
    }),
    [playing, toggle, stop, rate, calm, from, to, last, setEnd, modelSpan, all],
  );
}
