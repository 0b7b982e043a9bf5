import { fireEvent, render, screen } from '@testing-library/react';
import { Strip } from '@/components/strip/Strip';
import { stripOrder } from '@/components/strip/stripOrder';
import { ThemeProvider } from '@/components/ui/theme';

beforeAll(() => {
  HTMLCanvasElement.prototype.getContext = () => null; // jsdom has no canvas
  globalThis.ResizeObserver = class {
    observe() {}
    unobserve() {}
    disconnect() {}
  };
});

const show = (channel: number, onChannel: (c: number) => void) =>
  render(
    <ThemeProvider initial="dome">
      <Strip
        order={stripOrder([-30.5, -36.4, -42.2, -48])}
        channel={channel}
        onChannel={onChannel}
        picture={null}
        spectrum={[1, 2, 3, 4]}
        marks={new Map([[2, 9]])}
        span={null}
      />
    </ThemeProvider>,
  );

test('says velocity, channel and marks, by rising velocity in a file that descends', () => {
  show(2, () => undefined);
  const slider = screen.getByRole('slider', { name: 'Channel' });
  expect(slider.getAttribute('aria-valuetext')).toBe('−42.2 km/s, channel 3 of 4, 9 marks');
  expect(slider.getAttribute('aria-valuenow')).toBe('2');
});

test('keys step in velocity and stop at the ends', () => {
  const onChannel = jest.fn();
  show(2, onChannel);
  const slider = screen.getByRole('slider', { name: 'Channel' });
  for (const key of ['ArrowRight', 'ArrowLeft', 'Home', 'End', 'PageUp']) fireEvent.keyDown(slider, { key });
  expect(onChannel.mock.calls.flat()).toEqual([1, 3, 3, 0, 0]);
  onChannel.mockClear();
  fireEvent.keyDown(slider, { key: 'ArrowRight', ctrlKey: true });
  fireEvent.keyDown(slider, { key: 'x' });
  expect(onChannel).not.toHaveBeenCalled();
});
