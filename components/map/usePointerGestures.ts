import { useEffect, useRef, type RefObject } from 'react';
import {
  AT_REST,
  gesture,
  HOLD_MS,
  type GestureCommand,
  type GestureEvent,
  type Phase,
  type PointerKind,
} from '@/components/map/gestures';
import type { ChannelMapProps } from '@/components/map/ChannelMap';
import { listenToPointers } from '@/components/map/pointerEvents';
import { HIT_PX, markAt } from '@/components/map/scene';
import { panned, toImage, within, zoomedAbout, type ImagePoint } from '@/shared/image/viewport';

let drags = 0;

/** Wire the map's element to the gesture steps, and the commands to viewport, marks and callbacks. */
export function usePointerGestures(element: RefObject<HTMLElement | null>, props: ChannelMapProps): void {
  const latest = useRef(props);
  useEffect(() => {
    latest.current = props;
  });

  useEffect(() => {
    const target = element.current;
    if (!target) return;
    const { store } = latest.current;
    let state = AT_REST;
    /** A mark in the air: where the pointer has it, and where it came from. */
    let dragged: { id: string; at: ImagePoint; from: ImagePoint; gesture: string } | null = null;
    let frame = 0;
    let kind: PointerKind = 'mouse';
    let resting: ReturnType<typeof setTimeout> | undefined;

    const place = (e: MouseEvent) => {
      const box = target.getBoundingClientRect();
      return { sx: e.clientX - box.left, sy: e.clientY - box.top };
    };
    const reach = () => HIT_PX[kind] ?? HIT_PX.mouse;
    const hand = () => {
      frame = 0;
      if (dragged) latest.current.onMove(dragged.id, within(latest.current, dragged.at), dragged.gesture);
    };
    const endDrag = () => {
      cancelAnimationFrame(frame);
      hand();
      dragged = null;
    };
    const lasso = (phase: Phase, at: ImagePoint) => {
      const line = store.lasso.get() ?? [];
      if (phase === 'begin') return store.lasso.set([at]);
      if (phase === 'draw') return store.lasso.set([...line, at]);
      store.lasso.set(null);
      if (phase === 'end') latest.current.onLasso?.(line);
    };

    const obey = (command: GestureCommand) => {
      const v = store.viewport.get();
      if (!v) return;
      switch (command.do) {
        case 'pan':
          return store.viewport.set(panned(v, command.dsx, command.dsy));
        case 'zoom':
          return store.viewport.set(zoomedAbout(v, command.factor, command.at));
        case 'hover':
          store.crosshair.set(null);
          return store.hover.set(command.at ? toImage(v, command.at) : null);
        case 'aim':
          return store.aim.set(command.at);
        case 'select': {
          // A drag on one of several selected marks takes them all along.
          const { marks } = latest.current.scene;
          const kept = state.doing?.what === 'drag' && marks.some((m) => m.selected && m.id === command.mark);
          if (!kept) latest.current.onSelect(command.mark, command.extend);
          return;
        }
        case 'place': {
          const at = toImage(v, command.at);
          const inside = within(latest.current, at);
          if (at.x === inside.x && at.y === inside.y) latest.current.onPlace(at, 'pointer');
          return;
        }
        case 'lasso':
          return lasso(command.phase, toImage(v, command.at));
        case 'ring':
          return latest.current.onRing?.(command.phase, toImage(v, command.at), reach() / v.scale);
        case 'drag': {
          if (dragged?.id !== command.mark) {
            const mark = latest.current.scene.marks.find((m) => m.id === command.mark && m.away === 0);
            if (!mark) return;
            drags++;
            dragged = { id: mark.id, at: mark, from: mark, gesture: `drag ${drags}` };
          }
          dragged.at = { x: dragged.at.x + command.dsx / v.scale, y: dragged.at.y - command.dsy / v.scale };
          if (!frame) frame = requestAnimationFrame(hand); // at most one render a frame
          return;
        }
        case 'drop':
          return endDrag();
        case 'restore':
          if (dragged) dragged.at = dragged.from;
          return endDrag();
      }
    };
    const take = (event: GestureEvent) => {
      const [next, commands] = gesture(state, event);
      state = next;
      commands.forEach(obey);
    };

    const onDown = (e: PointerEvent) => {
      if (e.button !== 0) return;
      target.setPointerCapture?.(e.pointerId);
      const at = place(e);
      const v = store.viewport.get();
      kind = (e.pointerType || 'mouse') as PointerKind;
      const { scene, tool } = latest.current;
      const hit = v ? markAt(scene.marks, toImage(v, at), v.scale, reach()) : null;
      const id = e.pointerId;
      take({ type: 'down', id, at, kind, hit, tool, extend: e.shiftKey });
      clearTimeout(resting);
      if (kind !== 'mouse') resting = setTimeout(() => take({ type: 'hold', id }), HOLD_MS);
    };
    const onMove = (e: PointerEvent) => take({ type: 'move', id: e.pointerId, at: place(e) });
    const onUp = (e: PointerEvent) => {
      clearTimeout(resting);
      // where it was let go, too: a coarse pointer may not have said so as a move
      if (state.doing?.what !== 'press') take({ type: 'move', id: e.pointerId, at: place(e) });
      take({ type: 'up', id: e.pointerId, at: place(e) });
    };
    const onCancel = (e: PointerEvent) => {
      clearTimeout(resting);
      take({ type: 'cancel', id: e.pointerId });
    };
    const onLeave = () => take({ type: 'leave' });
    const onWheel = (e: WheelEvent) => {
      e.preventDefault();
      const unit = e.deltaMode === 1 ? 16 : e.deltaMode === 2 ? target.clientHeight : 1;
      take({ type: 'wheel', at: place(e), delta: e.deltaY * unit, pinch: e.ctrlKey });
    };
    // A long press of a finger would open the browser's own menu over the magnifier.
    const onMenu = (e: Event) => kind !== 'mouse' && e.preventDefault();

    const unlisten = listenToPointers(target, { onDown, onMove, onUp, onCancel, onLeave, onWheel });
    target.addEventListener('contextmenu', onMenu);
    return () => {
      cancelAnimationFrame(frame);
      clearTimeout(resting);
      target.removeEventListener('contextmenu', onMenu);
      unlisten();
    };
  }, [element]);
}
