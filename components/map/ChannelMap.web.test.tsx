import { act, fireEvent, render, screen } from '@testing-library/react';
import { ChannelMap } from '@/components/map/ChannelMap';
import { mapStore } from '@/components/map/mapStore';
import type { Scene } from '@/components/map/scene';
import { ThemeProvider } from '@/components/ui/theme';
import { rampOf } from '@/shared/image/palettes';

let sized: () => void = () => undefined;
beforeAll(() => {
  HTMLCanvasElement.prototype.getContext = () => null; // jsdom has no canvas
  globalThis.ResizeObserver = class {
    constructor(callback: () => void) {
      sized = callback;
    }
    observe() {}
    unobserve() {}
    disconnect() {}
  } as unknown as typeof ResizeObserver;
  for (const [name, size] of [
    ['clientWidth', 400],
    ['clientHeight', 400],
  ] as const)
    Object.defineProperty(HTMLElement.prototype, name, { configurable: true, value: size });
  HTMLElement.prototype.setPointerCapture = () => undefined;
});

const scene: Scene = {
  graticule: null,
  marks: [
    { id: 'here', x: 50, y: 50, away: 0, selected: false },
    { id: 'beside', x: 80, y: 80, away: 1, selected: false },
  ],
  modelRing: null,
  ownRing: null,
  centre: null,
  beam: null,
};

function show(marking = true) {
  const store = mapStore();
  const calls = { onPlace: jest.fn(), onSelect: jest.fn(), onMove: jest.fn() };
  render(
    <ThemeProvider initial="dome">
      <ChannelMap
        store={store}
        nx={100}
        ny={100}
        plane={null}
        stale={false}
        look={{ window: [0, 1], tone: 'even', ramp: rampOf('Ink'), blank: 0 }}
        scene={scene}
        label="Channel map at −42.2 kilometres per second"
        tool={marking ? 'mark' : 'move'}
        start={null}
        {...calls}
      />
    </ThemeProvider>,
  );
  act(() => sized());
  return { store, ...calls, map: screen.getByRole('application', { name: /Channel map/ }) };
}
/** jsdom knows no PointerEvent: a MouseEvent of that name carries what is read. */
const pointer = (map: HTMLElement, type: string, x: number, y: number) =>
  fireEvent(map, new MouseEvent(type, { bubbles: true, clientX: x, clientY: y, button: 0 }));

test('a tap places a mark at its pixel, with y upward', () => {
  const { map, onPlace } = show();
  pointer(map, 'pointerdown', 100, 80);
  pointer(map, 'pointerup', 100, 80);
  const at = onPlace.mock.calls[0][0];
  expect(at.x).toBeCloseTo(24.5, 9);
  expect(at.y).toBeCloseTo(79.5, 9);
});

test('a tap outside Mark mode, or beyond the image, places nothing', () => {
  const looking = show(false);
  pointer(looking.map, 'pointerdown', 100, 80);
  pointer(looking.map, 'pointerup', 100, 80);
  expect(looking.onPlace).not.toHaveBeenCalled();
  document.body.innerHTML = '';
  const { map, onPlace, store } = show();
  act(() => store.viewport.set({ ...store.viewport.get()!, scale: 2 }));
  pointer(map, 'pointerdown', 10, 10);
  pointer(map, 'pointerup', 10, 10);
  expect(onPlace).not.toHaveBeenCalled();
});

test('a tap on a mark selects it; the faint ones of other channels cannot be hit', () => {
  const { map, onSelect, onPlace } = show();
  pointer(map, 'pointerdown', 203, 197);
  pointer(map, 'pointerup', 203, 197);
  expect(onSelect).toHaveBeenCalledWith('here', false);
  pointer(map, 'pointerdown', 322, 78);
  pointer(map, 'pointerup', 322, 78);
  expect(onPlace).toHaveBeenCalledTimes(1);
});

test('the keyboard alone marks: arrows move the crosshair, Enter places, Escape puts it away', () => {
  const { map, onPlace, store } = show();
  fireEvent.keyDown(map, { key: 'Enter' });
  expect(onPlace).not.toHaveBeenCalled();
  fireEvent.keyDown(map, { key: 'ArrowUp' });
  fireEvent.keyDown(map, { key: 'ArrowRight', shiftKey: true });
  expect(store.crosshair.get()).toEqual({ x: 49.5 + 30 / 4, y: 49.5 + 6 / 4 });
  expect(store.hover.get()).toEqual(store.crosshair.get());
  fireEvent.keyDown(map, { key: 'Enter' });
  expect(onPlace).toHaveBeenCalledWith({ x: 57, y: 51 }, 'keys');
  fireEvent.keyDown(map, { key: 'Escape' });
  expect(store.crosshair.get()).toBeNull();
});
